import { NETWORK_TYPE, networkOperations } from '@/features/network';
import { networkPicture } from '@/features/network/index.server';
import { snapshotThroughView } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const GET = serve(networkOperations.network, async (actor, { params, query, request }) => {
  const { snapshot } = await snapshotThroughView(actor, params.snapshot, query.view);
  // A snapshot never changes, so its id says all; the right to see it is asked again each time.
  const etag = `"${snapshot.id}-1"`;
  const headers = { etag, 'cache-control': 'private, no-cache' };
  if (request.headers.get('if-none-match') === etag) return new Response(null, { status: 304, headers });
  const { length, body } = await networkPicture(snapshot.id);
  return new Response(body, {
    headers: { ...headers, 'content-type': NETWORK_TYPE, 'content-length': String(length) },
  });
});
