import { workspaceOperations } from '@/features/workspaces';
import { changeRole, removePerson } from '@/features/workspaces/index.server';
import { serve } from '@/server/http';

export const PATCH = serve(workspaceOperations.changeRole, (actor, { params, body }) =>
  changeRole(actor, params.workspace, params.person, body.role),
);

export const DELETE = serve(workspaceOperations.remove, async (actor, { params }) => {
  await removePerson(actor, params.workspace, params.person);
  return null;
});
