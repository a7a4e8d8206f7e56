import { importOperations } from '@/features/imports';
import { importFor, presentImport } from '@/features/imports/index.server';
import { serve } from '@/server/http';

export const GET = serve(importOperations.get, async (actor, { params }) =>
  presentImport(await importFor(actor, params.import)),
);
