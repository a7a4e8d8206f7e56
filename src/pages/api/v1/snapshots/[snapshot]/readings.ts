import { presentJob } from '@/features/jobs/index.server';
import { readingOperations } from '@/features/readings';
import { listReadings, makeReading } from '@/features/readings/index.server';
import { serve } from '@/server/http';

export const GET = serve(readingOperations.list, (actor, { params }) => listReadings(actor, params.snapshot));

export const POST = serve(readingOperations.make, async (actor, { params, body }) => {
  const { reading, job } = await makeReading(actor, params.snapshot, body);
  return { job: presentJob(job), reading: { id: reading.id } };
});
