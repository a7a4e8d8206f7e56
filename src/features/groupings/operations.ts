import * as z from 'zod';
import { idSchema } from '@/lib/ids';
import { operation } from '@/lib/operation';
import { acceptedSchema } from '@/features/jobs';
import {
  changeGroupingSchema,
  comparisonSchema,
  groupingMemberSchema,
  groupingSchema,
  groupingSummarySchema,
  makeGroupingSchema,
} from './groupings';

const shared = { tag: 'Groupings', access: 'person' } as const;
const one = z.object({ grouping: idSchema });
const ofSnapshot = z.object({ snapshot: idSchema });
/** A viewer reads a grouping through a saved view that is shared with them. */
const view = idSchema.optional();

export const groupingOperations = {
  list: operation({
    ...shared,
    id: 'listGroupings',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/groupings',
    summary: 'Groupings of a snapshot, newest first',
    params: ofSnapshot,
    status: 200,
    response: z.object({ items: z.array(groupingSummarySchema), nextCursor: z.null() }),
  }),
  make: operation({
    ...shared,
    id: 'makeGrouping',
    method: 'post',
    path: '/api/v1/snapshots/{snapshot}/groupings',
    summary: 'Divide the members into groups',
    params: ofSnapshot,
    body: makeGroupingSchema,
    status: 202,
    response: acceptedSchema,
  }),
  get: operation({
    ...shared,
    id: 'getGrouping',
    method: 'get',
    path: '/api/v1/groupings/{grouping}',
    summary: 'One grouping with cut, conductance, eigenvalues and bounds',
    params: one,
    query: z.object({ view }),
    status: 200,
    response: groupingSchema,
  }),
  change: operation({
    ...shared,
    id: 'changeGrouping',
    method: 'patch',
    path: '/api/v1/groupings/{grouping}',
    summary: 'Name the grouping or its groups',
    params: one,
    body: changeGroupingSchema,
    status: 200,
    response: groupingSchema,
  }),
  members: operation({
    ...shared,
    id: 'listGroupingMembers',
    method: 'get',
    path: '/api/v1/groupings/{grouping}/members',
    summary: 'Group and vector entry of every member',
    params: one,
    query: z.object({
      group: z.coerce.number().int().min(0).optional(),
      limit: z.coerce.number().int().min(1).max(10_000).default(1_000),
      cursor: z.string().max(40).optional(),
      view,
    }),
    status: 200,
    response: z.object({ items: z.array(groupingMemberSchema), nextCursor: z.string().nullable() }),
  }),
  membersCsv: operation({
    ...shared,
    id: 'exportGroupingMembers',
    method: 'get',
    path: '/api/v1/groupings/{grouping}/members.csv',
    summary: 'Group of every member as CSV',
    params: one,
    status: 200,
    produces: 'text/csv',
  }),
  compare: operation({
    ...shared,
    id: 'compareGroupings',
    method: 'get',
    path: '/api/v1/groupings/{grouping}/compare',
    summary: 'Agreement with another grouping, or with a label attribute, over members present in both',
    params: one,
    query: z.object({ with: idSchema }),
    status: 200,
    response: comparisonSchema,
  }),
};
