import type { APIRoute } from 'astro';
import { auth } from '@/features/account/index.server';

/** Ends the session and its cookie. */
export const POST: APIRoute = async ({ request }) => {
  const ended = await auth().api.signOut({ headers: request.headers, asResponse: true });
  const headers = new Headers({ location: '/sign-in' });
  for (const cookie of ended.headers.getSetCookie()) headers.append('set-cookie', cookie);
  return new Response(null, { status: 303, headers });
};
