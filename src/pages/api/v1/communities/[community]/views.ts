import { viewOperations } from '@/features/views';
import { createView, listViews } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const GET = serve(viewOperations.list, async (actor, { params }) => ({
  items: await listViews(actor, params.community),
}));

export const POST = serve(viewOperations.create, (actor, { params, body }) =>
  createView(actor, params.community, body),
);
