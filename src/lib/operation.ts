import type * as z from 'zod';

/**
 * One call of the HTTP API: the schemas that check a request are the ones that describe it,
 * so the OpenAPI document cannot drift from what the server does.
 */
export interface Operation<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
> {
  readonly id: string;
  readonly method: 'get' | 'post' | 'patch' | 'delete';
  /** Path template as in OpenAPI, `/api/v1/jobs/{job}`. */
  readonly path: `/${string}`;
  readonly summary: string;
  readonly tag: string;
  /** `public` answers anyone; `person` needs a session or a token. */
  readonly access: 'public' | 'person';
  readonly params?: Params;
  readonly query?: Query;
  /** JSON body. Leave out for multipart uploads and describe those in `summary`. */
  readonly body?: Body;
  readonly status: 200 | 201 | 202 | 204;
  readonly response?: z.ZodType;
  /** Media type of the answer where it is not JSON. */
  readonly produces?: string;
}

/** Keeps the schema types of an operation while checking its shape. */
export const operation = <P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType>(
  definition: Operation<P, Q, B>,
): Operation<P, Q, B> => definition;
