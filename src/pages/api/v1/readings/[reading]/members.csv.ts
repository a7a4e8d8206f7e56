import { readingOperations } from '@/features/readings';
import { exportReading } from '@/features/readings/index.server';
import { serve } from '@/server/http';

export const GET = serve(readingOperations.membersCsv, (actor, { params }) =>
  exportReading(actor, params.reading),
);
