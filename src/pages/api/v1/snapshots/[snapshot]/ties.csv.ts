import { networkOperations } from '@/features/network';
import { auditExport, snapshotFor, tiesCsv } from '@/features/network/index.server';
import { serve } from '@/server/http';

export const GET = serve(networkOperations.ties, async (actor, { params }) => {
  const { snapshot } = await snapshotFor(actor, params.snapshot, 'export.tables');
  await auditExport(actor, snapshot, 'ties.csv');
  return tiesCsv(snapshot);
});
