import { networkOperations } from '@/features/network';
import { createCommunity, listCommunities } from '@/features/network/index.server';
import { serve } from '@/server/http';

export const GET = serve(networkOperations.listCommunities, async (actor, { params }) => ({
  items: await listCommunities(actor, params.workspace),
}));

export const POST = serve(networkOperations.createCommunity, (actor, { params, body }) =>
  createCommunity(actor, params.workspace, body.name),
);
