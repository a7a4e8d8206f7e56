import { memberOperations } from '@/features/members';
import { memberColumn } from '@/features/members/index.server';
import { snapshotThroughView } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const GET = serve(memberOperations.values, async (actor, { params, query }) => {
  const shared = await snapshotThroughView(actor, params.snapshot, query.view);
  const { values, labels } = await memberColumn(shared, query.field);
  return new Response(values, {
    headers: {
      'content-type': 'application/octet-stream',
      'cache-control': 'private, no-cache',
      ...(labels ? { 'x-labels': encodeURIComponent(JSON.stringify(labels.slice(0, 200))) } : {}),
    },
  });
});
