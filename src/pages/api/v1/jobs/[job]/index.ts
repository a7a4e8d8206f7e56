import { jobOperations } from '@/features/jobs';
import { cancelJob, jobFor, presentJob } from '@/features/jobs/index.server';
import { serve } from '@/server/http';

export const GET = serve(jobOperations.get, async (actor, { params }) =>
  presentJob(await jobFor(actor, params.job)),
);

export const DELETE = serve(jobOperations.cancel, async (actor, { params }) =>
  presentJob(await cancelJob(actor, params.job)),
);
