import type { APIRoute } from 'astro';
import { auth } from '@/features/account/index.server';

export const ALL: APIRoute = ({ request, clientAddress }) => {
  // better-auth counts attempts by address; behind a proxy that is the proxy's to set.
  const headers = new Headers(request.headers);
  if (!headers.has('x-forwarded-for')) headers.set('x-forwarded-for', clientAddress);
  return auth().handler(new Request(request, { headers }));
};
