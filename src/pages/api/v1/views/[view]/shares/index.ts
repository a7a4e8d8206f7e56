import { viewOperations } from '@/features/views';
import { addShare, listShares } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const GET = serve(viewOperations.shares, async (actor, { params }) => ({
  items: await listShares(actor, params.view),
}));

export const POST = serve(viewOperations.share, (actor, { params, body }) =>
  addShare(actor, params.view, body),
);
