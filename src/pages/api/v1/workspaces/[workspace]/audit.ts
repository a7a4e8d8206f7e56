import { workspaceOperations } from '@/features/workspaces';
import { listAudit } from '@/features/workspaces/index.server';
import { serve } from '@/server/http';

export const GET = serve(workspaceOperations.audit, (actor, { params, query }) =>
  listAudit(actor, params.workspace, query.limit, query.cursor),
);
