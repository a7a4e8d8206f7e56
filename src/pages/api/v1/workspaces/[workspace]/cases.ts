import { caseOperations } from '@/features/cases';
import { listCases } from '@/features/cases/index.server';
import { serve } from '@/server/http';

export const GET = serve(caseOperations.list, (actor, { params, query }) =>
  listCases(actor, params.workspace, query),
);
