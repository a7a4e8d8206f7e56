import { caseOperations } from '@/features/cases';
import { decideCase } from '@/features/cases/index.server';
import { serve } from '@/server/http';

export const POST = serve(caseOperations.decide, (actor, { params, body }) =>
  decideCase(actor, params.case, body),
);
