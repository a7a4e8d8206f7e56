import { memberOperations } from '@/features/members';
import { memberHandles } from '@/features/members/index.server';
import { snapshotThroughView } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const GET = serve(memberOperations.handles, async (actor, { params, query }) =>
  memberHandles(actor, await snapshotThroughView(actor, params.snapshot, query.view)),
);
