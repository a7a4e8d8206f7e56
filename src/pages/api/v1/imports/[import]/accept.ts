import { importOperations } from '@/features/imports';
import { acceptImport } from '@/features/imports/index.server';
import { serve } from '@/server/http';

export const POST = serve(importOperations.accept, (actor, { params }) => acceptImport(actor, params.import));
