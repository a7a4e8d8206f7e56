import type { APIRoute } from 'astro';
import { auth } from '@/features/account/index.server';

export const ALL: APIRoute = async ({ request, clientAddress }) => {
  // better-auth counts attempts by address; behind a proxy that is the proxy's to set.
  const headers = new Headers(request.headers);
  if (!headers.has('x-forwarded-for')) headers.set('x-forwarded-for', clientAddress);
  const answer = await auth().handler(new Request(request, { headers }));
  const wait = answer.headers.get('x-retry-after');
  if (wait) answer.headers.set('retry-after', wait);
  return answer;
};
