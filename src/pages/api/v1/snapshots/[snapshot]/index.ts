import { networkOperations } from '@/features/network';
import { presentSnapshot } from '@/features/network/index.server';
import { snapshotThroughView } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const GET = serve(networkOperations.getSnapshot, async (actor, { params, query }) => {
  const { snapshot, through } = await snapshotThroughView(actor, params.snapshot, query.view);
  return presentSnapshot(snapshot, through?.fields ?? null);
});
