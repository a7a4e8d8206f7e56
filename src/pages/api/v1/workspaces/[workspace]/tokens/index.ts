import { workspaceOperations } from '@/features/workspaces';
import { createToken, listTokens } from '@/features/workspaces/index.server';
import { serve } from '@/server/http';

export const GET = serve(workspaceOperations.tokens, async (actor, { params }) => ({
  items: await listTokens(actor, params.workspace),
}));

export const POST = serve(workspaceOperations.createToken, (actor, { params, body }) =>
  createToken(actor, params.workspace, body),
);
