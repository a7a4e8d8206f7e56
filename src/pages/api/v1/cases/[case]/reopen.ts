import { caseOperations } from '@/features/cases';
import { reopenCase } from '@/features/cases/index.server';
import { serve } from '@/server/http';

export const POST = serve(caseOperations.reopen, (actor, { params, body }) =>
  reopenCase(actor, params.case, body),
);
