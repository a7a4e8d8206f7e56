import { jobOperations } from '@/features/jobs';
import { jobEvents, jobFor } from '@/features/jobs/index.server';
import { serve } from '@/server/http';

export const GET = serve(jobOperations.events, async (actor, { params, request }) => {
  await jobFor(actor, params.job);
  return new Response(jobEvents(params.job, request.signal), {
    headers: { 'content-type': 'text/event-stream', 'cache-control': 'no-store', 'x-accel-buffering': 'no' },
  });
});
