import { importOperations } from '@/features/imports';
import { discardImport } from '@/features/imports/index.server';
import { serve } from '@/server/http';

export const POST = serve(importOperations.discard, (actor, { params }) =>
  discardImport(actor, params.import),
);
