import { importOperations } from '@/features/imports';
import { problemsCsv } from '@/features/imports/index.server';
import { serve } from '@/server/http';

export const GET = serve(importOperations.problems, (actor, { params }) => problemsCsv(actor, params.import));
