import * as z from 'zod';
import { idSchema } from '@/lib/ids';
import { operation } from '@/lib/operation';
import { fieldSchema, filtersSchema } from '@/features/views';

/** A JSON value in a query parameter. */
const jsonParameter = <S extends z.ZodType>(schema: S) =>
  z
    .string()
    .transform((text, context) => {
      try {
        return JSON.parse(text) as unknown;
      } catch {
        context.addIssue({ code: 'custom', message: 'Not JSON.' });
        return z.NEVER;
      }
    })
    .pipe(schema);

export const membersQuerySchema = z.object({
  /** A field, or `-` and a field for descending. */
  sort: z
    .string()
    .transform((text) => ({ field: text.replace(/^-/, ''), descending: text.startsWith('-') }))
    .pipe(z.object({ field: fieldSchema, descending: z.boolean() }))
    .optional(),
  filter: jsonParameter(filtersSchema).default([]),
  /** Fields, separated by commas. */
  columns: z
    .string()
    .transform((text) => text.split(',').filter(Boolean))
    .pipe(z.array(fieldSchema).max(40))
    .default([]),
  limit: z.coerce.number().int().min(1).max(10_000).default(100),
  cursor: z.string().max(40).optional(),
  view: idSchema.optional(),
});
export type MembersQuery = z.output<typeof membersQuerySchema>;

/** A cell: a number, a label, a group index, or null where there is none or it is not for this role. */
export const cellSchema = z.union([z.number(), z.string(), z.null()]);

export const memberRowSchema = z
  .object({
    id: z.string(),
    externalId: z.string().nullable(),
    name: z.string().nullable(),
    /** What stands for the name where names are hidden. */
    code: z.string().nullable(),
    ordinal: z.int(),
    values: z.record(z.string(), cellSchema),
    /** Fields whose value in `values` was filled in by a reading, not recorded. */
    filled: z.array(z.string()),
  })
  .meta({ id: 'MemberRow' });
export type MemberRow = z.infer<typeof memberRowSchema>;

/** One member and those tied to them, for the side panel of the Map. */
export interface MemberDetail {
  readonly member: MemberRow;
  readonly degree: number;
  /** Tied members, strongest tie first. */
  readonly neighbours: readonly (MemberRow & { weight: number; tieKind: string | null; count: number })[];
}

export const membersPageSchema = z.object({
  items: z.array(memberRowSchema),
  total: z.int(),
  nextCursor: z.string().nullable(),
});
export type MembersPage = z.infer<typeof membersPageSchema>;

export const handlesSchema = z
  .object({ ids: z.array(z.string()), names: z.array(z.string()) })
  .meta({ id: 'Handles' });
export type Handles = z.infer<typeof handlesSchema>;

const params = z.object({ snapshot: idSchema });
const shared = { tag: 'Members', access: 'person', params } as const;

export const memberOperations = {
  list: operation({
    ...shared,
    id: 'listMembers',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/members',
    summary: 'Rows of the members table: any fields, filters and order',
    query: membersQuerySchema,
    status: 200,
    response: membersPageSchema,
  }),
  csv: operation({
    ...shared,
    id: 'exportMembersCsv',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/members.csv',
    summary: 'The same rows, all of them, as CSV',
    query: membersQuerySchema,
    status: 200,
    produces: 'text/csv',
  }),
  jsonl: operation({
    ...shared,
    id: 'exportMembersJsonl',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/members.jsonl',
    summary: 'The same rows, all of them, as JSON Lines',
    query: membersQuerySchema,
    status: 200,
    produces: 'application/jsonl',
  }),
  xlsx: operation({
    ...shared,
    id: 'exportMembersXlsx',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/members.xlsx',
    summary: 'The same rows, all of them, as a workbook with typed cells',
    query: membersQuerySchema,
    status: 200,
    produces: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
  }),
  parquet: operation({
    ...shared,
    id: 'exportMembersParquet',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/members.parquet',
    summary: 'The same rows, all of them, as Apache Parquet',
    query: membersQuerySchema,
    status: 200,
    produces: 'application/vnd.apache.parquet',
  }),
  get: operation({
    ...shared,
    id: 'getMember',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/members/{member}',
    summary: 'One member with ties to neighbours',
    params: params.extend({ member: idSchema }),
    query: membersQuerySchema.pick({ columns: true, view: true }),
    status: 200,
  }),
  values: operation({
    ...shared,
    id: 'getValues',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/values',
    summary:
      'One field of every member, in member order: little-endian 64-bit floats, NaN where there is none. Labels are numbered by `x-labels`, a JSON array.',
    query: z.object({ field: fieldSchema, view: idSchema.optional() }),
    status: 200,
    produces: 'application/octet-stream',
  }),
  handles: operation({
    ...shared,
    id: 'getHandles',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/handles',
    summary: 'Ids and names (or codes, where names are hidden) of every member, in member order',
    query: z.object({ view: idSchema.optional() }),
    status: 200,
    response: handlesSchema,
  }),
  matching: operation({
    ...shared,
    id: 'getMatching',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/matching',
    summary: 'Which members pass the filters, in member order: one byte each, 1 or 0',
    query: z.object({ filter: jsonParameter(filtersSchema), view: idSchema.optional() }),
    status: 200,
    produces: 'application/octet-stream',
  }),
};
