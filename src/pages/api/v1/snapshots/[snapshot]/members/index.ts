import { memberOperations } from '@/features/members';
import { memberRows } from '@/features/members/index.server';
import { snapshotThroughView } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const GET = serve(memberOperations.list, async (actor, { params, query }) =>
  memberRows(actor, await snapshotThroughView(actor, params.snapshot, query.view), query),
);
