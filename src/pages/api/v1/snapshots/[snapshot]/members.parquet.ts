import { memberOperations } from '@/features/members';
import { exportMembers } from '@/features/members/index.server';
import { snapshotThroughView } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const GET = serve(memberOperations.parquet, async (actor, { params, query }) =>
  exportMembers(
    actor,
    await snapshotThroughView(actor, params.snapshot, undefined, 'export.tables'),
    query,
    'parquet',
  ),
);
