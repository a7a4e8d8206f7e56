import { viewOperations } from '@/features/views';
import { changeView, deleteView, getView } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const GET = serve(viewOperations.get, (actor, { params }) => getView(actor, params.view));

export const PATCH = serve(viewOperations.change, (actor, { params, body }) =>
  changeView(actor, params.view, body),
);

export const DELETE = serve(viewOperations.remove, async (actor, { params }) => {
  await deleteView(actor, params.view);
  return null;
});
