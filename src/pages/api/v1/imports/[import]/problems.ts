import { importOperations } from '@/features/imports';
import { problemPage } from '@/features/imports/index.server';
import { serve } from '@/server/http';

export const GET = serve(importOperations.problemPage, (actor, { params, query }) =>
  problemPage(actor, params.import, query),
);
