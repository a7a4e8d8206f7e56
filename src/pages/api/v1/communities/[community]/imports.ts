import { importOperations } from '@/features/imports';
import { listImports, makeImport, presentImport, receiveUpload } from '@/features/imports/index.server';
import { presentJob } from '@/features/jobs/index.server';
import { communityFor } from '@/features/network/index.server';
import { serve } from '@/server/http';

export const GET = serve(importOperations.list, async (actor, { params }) => ({
  items: await listImports(actor, params.community),
}));

export const POST = serve(importOperations.upload, async (actor, { params, request }) => {
  // Asked before the first byte is stored.
  await communityFor(actor, params.community, 'analysis.make');
  const { row, job, repeated } = await makeImport(actor, params.community, await receiveUpload(request));
  return { job: presentJob(job), import: await presentImport(row), repeated };
});
