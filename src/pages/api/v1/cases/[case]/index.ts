import { caseOperations } from '@/features/cases';
import { changeCase, getCase } from '@/features/cases/index.server';
import { serve } from '@/server/http';

export const GET = serve(caseOperations.get, (actor, { params }) => getCase(actor, params.case));

export const PATCH = serve(caseOperations.change, (actor, { params, body }) =>
  changeCase(actor, params.case, body),
);
