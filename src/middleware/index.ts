import { randomUUID } from 'node:crypto';
import { defineMiddleware, sequence } from 'astro:middleware';
import { actorOf } from '@/features/account/index.server';
import { ProblemError } from '@/lib/problem';
import { problemResponse } from '@/server/http';
import { observe } from '@/server/metrics';
import { secure } from './headers';
import { isForeign } from './origin';

/** Paths that answer before anyone is known. */
const OPEN = /^\/(healthz|readyz|metrics|_astro\/|favicon|theme\.js)/;

const identify = defineMiddleware(async (context, next) => {
  context.locals.requestId = randomUUID().slice(0, 8);
  context.locals.actor = null;
  if (OPEN.test(context.url.pathname)) return next();
  const started = performance.now();
  try {
    const actor = await actorOf(context.request.headers);
    // A token is for the API; pages and their forms are for people.
    const forApi = context.url.pathname.startsWith('/api/');
    context.locals.actor = actor?.via === 'token' && !forApi ? null : actor;
  } catch (error) {
    return problemResponse(error, context.locals.requestId);
  }
  const response = await next();
  observe(context.request.method, context.routePattern, response.status, performance.now() - started);
  return response;
});

const sameOrigin = defineMiddleware((context, next) =>
  isForeign(context.request)
    ? problemResponse(
        new ProblemError(403, 'foreign-origin', 'Not allowed.', 'This request came from another site.'),
      )
    : next(),
);

const headers = defineMiddleware(async (context, next) => secure(await next(), context.url));

export const onRequest = sequence(headers, identify, sameOrigin);
