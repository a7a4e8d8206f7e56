import { caseOperations } from '@/features/cases';
import { addNote } from '@/features/cases/index.server';
import { serve } from '@/server/http';

export const POST = serve(caseOperations.note, (actor, { params, body }) =>
  addNote(actor, params.case, body.body),
);
