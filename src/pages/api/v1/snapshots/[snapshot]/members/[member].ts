import { memberOperations } from '@/features/members';
import { memberDetail } from '@/features/members/index.server';
import { snapshotThroughView } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const GET = serve(memberOperations.get, async (actor, { params, query }) =>
  memberDetail(
    actor,
    await snapshotThroughView(actor, params.snapshot, query.view),
    params.member,
    query.columns,
  ),
);
