import { groupingOperations } from '@/features/groupings';
import { changeGrouping, getGrouping } from '@/features/groupings/index.server';
import { serve } from '@/server/http';

export const GET = serve(groupingOperations.get, (actor, { params, query }) =>
  getGrouping(actor, params.grouping, query.view),
);

export const PATCH = serve(groupingOperations.change, (actor, { params, body }) =>
  changeGrouping(actor, params.grouping, body),
);
