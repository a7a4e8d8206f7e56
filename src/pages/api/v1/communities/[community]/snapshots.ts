import { networkOperations } from '@/features/network';
import { listSnapshots } from '@/features/network/index.server';
import { serve } from '@/server/http';

export const GET = serve(networkOperations.listSnapshots, async (actor, { params }) => ({
  items: await listSnapshots(actor, params.community),
}));
