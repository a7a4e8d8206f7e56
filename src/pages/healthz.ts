import type { APIRoute } from 'astro';

export const GET: APIRoute = () => new Response('ok\n', { headers: { 'cache-control': 'no-store' } });
