import type { APIContext, APIRoute } from 'astro';
import type * as z from 'zod';
import type { Actor } from '@/lib/actor';
import type { Operation } from '@/lib/operation';
import { forbidden, notFound, notSignedIn } from '@/lib/problem';
import { readJson, validate } from './input';
import { problemResponse } from './problems';

export interface Call<P, Q, B> {
  readonly params: P;
  readonly query: Q;
  readonly body: B;
  readonly request: Request;
  readonly context: APIContext;
}

type Answer = object | Response | null;
type Output<T> = T extends z.ZodType ? z.output<T> : undefined;

/**
 * Turns an operation and a handler into an Astro endpoint: who is asking, is the input well formed, then the
 * handler, then JSON. Whether this person may do this to this thing is the handler's first step (`authorise`).
 * A path id that cannot be an id is "not there", like any other that is not.
 */
export function serve<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType>(
  operation: Operation<P, Q, B>,
  handler: (actor: Actor, call: Call<Output<P>, Output<Q>, Output<B>>) => Promise<Answer>,
): APIRoute {
  return async (context) => {
    try {
      const actor = context.locals.actor;
      if (!actor) throw notSignedIn();
      if (operation.method !== 'get' && actor.readOnly) throw forbidden('This API token may only read.');
      const params = operation.params?.safeParse(context.params);
      if (params && !params.success) throw notFound();
      const query = operation.query
        ? validate(operation.query, Object.fromEntries(context.url.searchParams), 'query')
        : undefined;
      const body = operation.body
        ? validate(operation.body, await readJson(context.request), 'body')
        : undefined;
      const answer = await handler(actor, {
        params: params?.data as Output<P>,
        query: query as Output<Q>,
        body: body as Output<B>,
        request: context.request,
        context,
      });
      if (answer instanceof Response) return answer;
      if (answer === null) return new Response(null, { status: 204 });
      const headers = answeredJob(answer);
      return Response.json(answer, { status: operation.status, headers });
    } catch (error) {
      return problemResponse(error, context.locals.requestId);
    }
  };
}

/** A 202 answer carries its job, and `Location` says where to follow it. */
function answeredJob(answer: object): Record<string, string> {
  const headers: Record<string, string> = { 'cache-control': 'no-store' };
  const job = (answer as { job?: { id?: string } }).job;
  if (job?.id) headers.location = `/api/v1/jobs/${job.id}`;
  return headers;
}
