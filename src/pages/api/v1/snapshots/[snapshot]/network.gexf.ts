import { networkOperations } from '@/features/network';
import { auditExport, graphFile, snapshotFor } from '@/features/network/index.server';
import { serve } from '@/server/http';

export const GET = serve(networkOperations.gexf, async (actor, { params }) => {
  const { snapshot } = await snapshotFor(actor, params.snapshot, 'export.tables');
  await auditExport(actor, snapshot, 'network.gexf');
  return graphFile(snapshot, 'gexf');
});
