import { workspaceOperations } from '@/features/workspaces';
import { listPeople } from '@/features/workspaces/index.server';
import { serve } from '@/server/http';

export const GET = serve(workspaceOperations.people, async (actor, { params }) => ({
  items: await listPeople(actor, params.workspace),
}));
