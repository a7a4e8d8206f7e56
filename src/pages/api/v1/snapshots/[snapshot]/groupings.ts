import { groupingOperations } from '@/features/groupings';
import { listGroupings, makeGrouping } from '@/features/groupings/index.server';
import { presentJob } from '@/features/jobs/index.server';
import { serve } from '@/server/http';

export const GET = serve(groupingOperations.list, (actor, { params }) =>
  listGroupings(actor, params.snapshot),
);

export const POST = serve(groupingOperations.make, async (actor, { params, body }) => {
  const { grouping, job } = await makeGrouping(actor, params.snapshot, body);
  return { job: presentJob(job), grouping: { id: grouping.id } };
});
