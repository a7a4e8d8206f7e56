import * as z from 'zod';
import { createDocument, type ZodOpenApiOperationObject, type ZodOpenApiPathsObject } from 'zod-openapi';
import type { Operation } from './operation';

const problem = z
  .object({
    type: z.string(),
    title: z.string(),
    status: z.int(),
    detail: z.string(),
    errors: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
  })
  .meta({ id: 'Problem', description: 'RFC 9457 problem document' });

const problemResponse = (description: string) => ({
  description,
  content: { 'application/problem+json': { schema: problem } },
});

function success(operation: Operation): ZodOpenApiOperationObject['responses'][`${200}`] {
  if (operation.produces) return { description: operation.summary, content: { [operation.produces]: {} } };
  if (!operation.response) return { description: operation.summary };
  return { description: operation.summary, content: { 'application/json': { schema: operation.response } } };
}

function describe(operation: Operation): ZodOpenApiOperationObject {
  const open = operation.access === 'public';
  return {
    operationId: operation.id,
    summary: operation.summary,
    tags: [operation.tag],
    ...(open ? { security: [] } : {}),
    requestParams: {
      ...(operation.params ? { path: operation.params as z.ZodObject } : {}),
      ...(operation.query ? { query: operation.query as z.ZodObject } : {}),
    },
    ...(operation.body
      ? { requestBody: { content: { 'application/json': { schema: operation.body } } } }
      : {}),
    responses: {
      [`${operation.status}`]: success(operation),
      ...(open
        ? {}
        : {
            401: problemResponse('Not signed in'),
            403: problemResponse('Role does not allow'),
            404: problemResponse('Not there, or not yours'),
          }),
      ...(operation.body || operation.query ? { 400: problemResponse('Malformed') } : {}),
      ...(operation.method === 'get'
        ? {}
        : { 409: problemResponse('Conflict'), 422: problemResponse('Well-formed but impossible') }),
    },
  };
}

/** The OpenAPI 3.1 document of a list of operations, made from the schemas that check their requests. */
export function openApiDocument(operations: readonly Operation[], version: string): object {
  const paths: ZodOpenApiPathsObject = {};
  for (const operation of operations) {
    const path = (paths[operation.path] ??= {});
    path[operation.method] = describe(operation);
  }
  return createDocument({
    openapi: '3.1.0',
    info: {
      title: 'Thrum',
      version,
      description: 'Graph signals for the people who look after large member communities.',
    },
    security: [{ session: [] }, { token: [] }],
    components: {
      securitySchemes: {
        session: { type: 'apiKey', in: 'cookie', name: 'better-auth.session_token' },
        token: { type: 'http', scheme: 'bearer' },
      },
    },
    paths,
  });
}
