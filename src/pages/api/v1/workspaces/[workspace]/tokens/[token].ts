import { workspaceOperations } from '@/features/workspaces';
import { revokeToken } from '@/features/workspaces/index.server';
import { serve } from '@/server/http';

export const DELETE = serve(workspaceOperations.revokeToken, async (actor, { params }) => {
  await revokeToken(actor, params.workspace, params.token);
  return null;
});
