import { networkOperations } from '@/features/network';
import { snapshotFor, spectrumOf } from '@/features/network/index.server';
import { serve } from '@/server/http';

export const GET = serve(networkOperations.spectrum, async (actor, { params, query }) => {
  const { snapshot } = await snapshotFor(actor, params.snapshot, 'explore.open');
  return spectrumOf(snapshot, query.laplacian, query.count);
});
