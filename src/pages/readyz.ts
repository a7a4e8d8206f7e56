import type { APIRoute } from 'astro';
import { readiness } from '@/server/health';

export const GET: APIRoute = async () => {
  const state = await readiness();
  return Response.json(state, {
    status: state.database && state.worker ? 200 : 503,
    headers: { 'cache-control': 'no-store' },
  });
};
