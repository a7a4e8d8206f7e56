import { viewOperations } from '@/features/views';
import { endShare } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const DELETE = serve(viewOperations.unshare, async (actor, { params }) => {
  await endShare(actor, params.view, params.share);
  return null;
});
