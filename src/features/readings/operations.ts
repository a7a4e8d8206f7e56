import * as z from 'zod';
import { idSchema } from '@/lib/ids';
import { operation } from '@/lib/operation';
import { acceptedSchema } from '@/features/jobs';
import {
  makeReadingSchema,
  readingLineSchema,
  readingMemberSchema,
  readingMembersQuerySchema,
  readingSchema,
} from './readings';

const shared = { tag: 'Readings', access: 'person' } as const;
const one = z.object({ reading: idSchema });
const ofSnapshot = z.object({ snapshot: idSchema });

export const readingOperations = {
  list: operation({
    ...shared,
    id: 'listReadings',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/readings',
    summary: 'Readings of a snapshot, newest first',
    params: ofSnapshot,
    status: 200,
    response: z.object({ items: z.array(readingLineSchema), nextCursor: z.null() }),
  }),
  make: operation({
    ...shared,
    id: 'makeReading',
    method: 'post',
    path: '/api/v1/snapshots/{snapshot}/readings',
    summary: 'Take a reading of one attribute',
    params: ofSnapshot,
    body: makeReadingSchema,
    status: 202,
    response: acceptedSchema,
  }),
  get: operation({
    ...shared,
    id: 'getReading',
    method: 'get',
    path: '/api/v1/readings/{reading}',
    summary: 'Global statistics, smoother and what was computed how',
    params: one,
    status: 200,
    response: readingSchema,
  }),
  members: operation({
    ...shared,
    id: 'listReadingMembers',
    method: 'get',
    path: '/api/v1/readings/{reading}/members',
    summary: 'Score, smoothed score, departure and local Moran of every member',
    params: one,
    query: readingMembersQuerySchema,
    status: 200,
    response: z.object({ items: z.array(readingMemberSchema), nextCursor: z.string().nullable() }),
  }),
  membersCsv: operation({
    ...shared,
    id: 'exportReadingMembers',
    method: 'get',
    path: '/api/v1/readings/{reading}/members.csv',
    summary: 'The same as CSV',
    params: one,
    status: 200,
    produces: 'text/csv',
  }),
};
