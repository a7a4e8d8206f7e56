import { memberOperations } from '@/features/members';
import { matchingMembers } from '@/features/members/index.server';
import { snapshotThroughView } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const GET = serve(memberOperations.matching, async (actor, { params, query }) => {
  const mask = await matchingMembers(
    await snapshotThroughView(actor, params.snapshot, query.view),
    query.filter,
  );
  return new Response(mask, {
    headers: { 'content-type': 'application/octet-stream', 'cache-control': 'private, no-cache' },
  });
});
