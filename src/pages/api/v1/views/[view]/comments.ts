import { viewOperations } from '@/features/views';
import { addComment, listComments } from '@/features/views/index.server';
import { serve } from '@/server/http';

export const GET = serve(viewOperations.comments, async (actor, { params }) => ({
  items: await listComments(actor, params.view),
}));

export const POST = serve(viewOperations.comment, (actor, { params, body }) =>
  addComment(actor, params.view, body.body),
);
