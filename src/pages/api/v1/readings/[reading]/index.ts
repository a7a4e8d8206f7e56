import { readingOperations } from '@/features/readings';
import { getReading } from '@/features/readings/index.server';
import { serve } from '@/server/http';

export const GET = serve(readingOperations.get, (actor, { params }) => getReading(actor, params.reading));
