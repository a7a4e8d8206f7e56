import { randomUUID } from 'node:crypto';
import { defineMiddleware, sequence } from 'astro:middleware';
import { actorOf, trustedOrigins } from '@/features/account/index.server';
import { ProblemError } from '@/lib/problem';
import { problemResponse } from '@/server/http';
import { observe } from '@/server/metrics';
import { secure } from './headers';

/** Paths that answer before anyone is known. */
const OPEN = /^\/(healthz|readyz|metrics|_astro\/|favicon|theme\.js)/;
const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

const identify = defineMiddleware(async (context, next) => {
  context.locals.requestId = randomUUID().slice(0, 8);
  context.locals.actor = null;
  if (OPEN.test(context.url.pathname)) return next();
  const started = performance.now();
  try {
    context.locals.actor = await actorOf(context.request.headers);
  } catch (error) {
    return problemResponse(error, context.locals.requestId);
  }
  const response = await next();
  observe(context.request.method, context.routePattern, response.status, performance.now() - started);
  return response;
});

/** A page of another site must not act with this person's cookie, neither by form nor by script. */
const sameOrigin = defineMiddleware((context, next) => {
  const { request } = context;
  if (SAFE.has(request.method) || !request.headers.get('cookie') || request.headers.get('authorization'))
    return next();
  const origin = request.headers.get('origin');
  const site = request.headers.get('sec-fetch-site');
  const foreign = origin
    ? !trustedOrigins(request).includes(origin)
    : site !== null && site !== 'same-origin' && site !== 'none';
  if (!foreign) return next();
  return problemResponse(
    new ProblemError(403, 'foreign-origin', 'Not allowed.', 'This request came from another site.'),
  );
});

const headers = defineMiddleware(async (context, next) => secure(await next(), context.url));

export const onRequest = sequence(headers, identify, sameOrigin);
