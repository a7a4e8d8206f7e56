import { accountOperations } from '@/features/account';
import { myWorkspaces } from '@/features/workspaces/index.server';
import { serve } from '@/server/http';

export const GET = serve(accountOperations.me, async (actor) => ({
  id: actor.userId,
  name: actor.name,
  email: actor.email,
  via: actor.via,
  workspaces: await myWorkspaces(actor),
}));
