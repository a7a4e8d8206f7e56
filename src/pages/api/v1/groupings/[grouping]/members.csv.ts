import { groupingOperations } from '@/features/groupings';
import { exportGrouping } from '@/features/groupings/index.server';
import { serve } from '@/server/http';

export const GET = serve(groupingOperations.membersCsv, (actor, { params }) =>
  exportGrouping(actor, params.grouping),
);
