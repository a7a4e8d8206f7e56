import type { APIRoute } from 'astro';
import { metricsText } from '@/server/metrics';

/** For a collector on the same machine; a proxy should not pass this path on. */
export const GET: APIRoute = async ({ clientAddress }) => {
  if (!/^(127\.|::1$|::ffff:127\.)/.test(clientAddress)) return new Response(null, { status: 404 });
  return new Response(await metricsText(), {
    headers: { 'content-type': 'text/plain; version=0.0.4; charset=utf-8', 'cache-control': 'no-store' },
  });
};
