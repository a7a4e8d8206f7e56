import { groupingOperations } from '@/features/groupings';
import { compareGrouping } from '@/features/groupings/index.server';
import { serve } from '@/server/http';

export const GET = serve(groupingOperations.compare, (actor, { params, query }) =>
  compareGrouping(actor, params.grouping, query.with),
);
