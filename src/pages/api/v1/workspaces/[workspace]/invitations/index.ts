import { invitationLetter } from '@/features/account/index.server';
import { workspaceOperations } from '@/features/workspaces';
import { invite, listInvitations } from '@/features/workspaces/index.server';
import { serve } from '@/server/http';

export const GET = serve(workspaceOperations.invitations, async (actor, { params }) => ({
  items: await listInvitations(actor, params.workspace),
}));

export const POST = serve(workspaceOperations.invite, (actor, { params, body }) =>
  invite(actor, params.workspace, body, invitationLetter),
);
