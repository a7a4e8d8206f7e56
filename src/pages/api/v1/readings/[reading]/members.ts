import { readingOperations } from '@/features/readings';
import { readingMembers } from '@/features/readings/index.server';
import { serve } from '@/server/http';

export const GET = serve(readingOperations.members, (actor, { params, query }) =>
  readingMembers(actor, params.reading, query),
);
