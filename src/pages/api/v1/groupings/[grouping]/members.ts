import { groupingOperations } from '@/features/groupings';
import { groupingMembers } from '@/features/groupings/index.server';
import { serve } from '@/server/http';

export const GET = serve(groupingOperations.members, (actor, { params, query }) =>
  groupingMembers(actor, params.grouping, query),
);
