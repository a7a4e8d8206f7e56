import { workspaceOperations } from '@/features/workspaces';
import { revokeInvitation } from '@/features/workspaces/index.server';
import { serve } from '@/server/http';

export const DELETE = serve(workspaceOperations.revoke, async (actor, { params }) => {
  await revokeInvitation(actor, params.workspace, params.invitation);
  return null;
});
