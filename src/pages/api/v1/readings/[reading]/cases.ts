import { caseOperations } from '@/features/cases';
import { openCases } from '@/features/cases/index.server';
import { serve } from '@/server/http';

export const POST = serve(caseOperations.open, async (actor, { params, query, body }) => {
  const preview = body.preview || query.preview === 'true';
  const answer = await openCases(actor, params.reading, { ...body, preview });
  return Response.json(answer, { status: preview ? 200 : 201, headers: { 'cache-control': 'no-store' } });
});
