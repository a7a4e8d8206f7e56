import * as z from 'zod';
import { idSchema } from '@/lib/ids';
import { operation } from '@/lib/operation';
import { acceptedSchema } from '@/features/jobs';

/** What one import may hold; said before the upload and enforced while streaming. */
export const LIMITS = {
  fileBytes: 512 * 1024 * 1024,
  /** After unpacking gzip. */
  textBytes: 2 * 1024 * 1024 * 1024,
  tieRows: 10_000_000,
  memberRows: 1_000_000,
  columns: 200,
  cells: 20_000_000,
  cellLength: 10_000,
  idLength: 200,
  /** Refused rows kept with their reason; all are counted. */
  problems: 100_000,
} as const;

const columnName = z.string().min(1).max(500);

const attributeSchema = z.object({
  column: columnName,
  name: z.string().trim().min(1).max(120),
  type: z.enum(['number', 'label']).optional(),
  direction: z.enum(['higher-better', 'higher-worse', 'neither']).default('neither'),
  sensitive: z.boolean().default(false),
  countColumn: columnName.optional(),
});
export type AttributeOption = z.infer<typeof attributeSchema>;

export const importOptionsSchema = z.object({
  takenOn: z.iso.date().optional(),
  label: z.string().trim().max(120).optional(),
  accept: z.enum(['auto', 'review']).default('auto'),
  ties: z
    .object({
      source: columnName,
      target: columnName,
      weight: columnName,
      kind: columnName,
      time: columnName,
    })
    .partial()
    .default({}),
  members: z
    .object({ id: columnName, name: columnName, attributes: z.array(attributeSchema).max(LIMITS.columns) })
    .partial()
    .default({}),
  directions: z.enum(['sum', 'larger', 'mutual']).default('sum'),
  repeats: z.enum(['sum', 'count', 'largest']).default('sum'),
  logWeight: z.boolean().default(false),
  halfLifeDays: z.number().positive().max(100_000).nullable().default(null),
  minimumWeight: z.number().nonnegative().nullable().default(null),
});
export type ImportOptions = z.output<typeof importOptionsSchema>;

export const countsSchema = z.object({
  tieRows: z.object({
    read: z.int(),
    kept: z.int(),
    merged: z.int(),
    refused: z.int(),
    selfTies: z.int(),
    /** Rows of ties that the choices leave out: only one direction, or too light. */
    leftOut: z.int(),
  }),
  memberRows: z.object({
    read: z.int(),
    kept: z.int(),
    refused: z.int(),
    blankCells: z.int(),
    refusedCells: z.int(),
  }),
  membersFromTies: z.int(),
});
export type ImportCounts = z.infer<typeof countsSchema>;

export const problemSchema = z.object({
  file: z.enum(['ties', 'members']),
  line: z.int(),
  column: z.string().nullable(),
  value: z.string().nullable(),
  reason: z.string(),
});
export type ImportProblem = z.infer<typeof problemSchema>;

export const warningSchema = z.object({ code: z.string(), text: z.string() });
export type ImportWarning = z.infer<typeof warningSchema>;

export const importSchema = z
  .object({
    id: z.string(),
    communityId: z.string(),
    state: z.enum(['received', 'checking', 'review', 'accepted', 'discarded', 'failed', 'cancelled']),
    files: z.array(z.object({ role: z.enum(['ties', 'members']), name: z.string(), bytes: z.number() })),
    options: z.record(z.string(), z.unknown()),
    counts: countsSchema.nullable(),
    warnings: z.array(warningSchema),
    problems: z.array(problemSchema),
    problemsTotal: z.int(),
    snapshotId: z.string().nullable(),
    jobId: z.string().nullable(),
    createdAt: z.string(),
    finishedAt: z.string().nullable(),
  })
  .meta({ id: 'Import' });
export type ImportView = z.infer<typeof importSchema>;

const one = z.object({ import: idSchema });
const community = z.object({ community: idSchema });
const shared = { tag: 'Imports', access: 'person' } as const;

export const importOperations = {
  upload: operation({
    ...shared,
    id: 'createImport',
    method: 'post',
    path: '/api/v1/communities/{community}/imports',
    summary:
      'Upload multipart/form-data: `ties` (file), `members` (file, optional), `options` (JSON, optional). The same files and options twice answer with the first import.',
    params: community,
    status: 202,
    response: acceptedSchema.extend({ import: importSchema, repeated: z.boolean() }),
  }),
  list: operation({
    ...shared,
    id: 'listImports',
    method: 'get',
    path: '/api/v1/communities/{community}/imports',
    summary: 'Imports of a community, newest first',
    params: community,
    status: 200,
    response: z.object({ items: z.array(importSchema) }),
  }),
  get: operation({
    ...shared,
    id: 'getImport',
    method: 'get',
    path: '/api/v1/imports/{import}',
    summary: 'Counts, warnings and the first problems',
    params: one,
    status: 200,
    response: importSchema,
  }),
  problems: operation({
    ...shared,
    id: 'importProblems',
    method: 'get',
    path: '/api/v1/imports/{import}/problems.csv',
    summary: 'Every refused row with line, column and reason',
    params: one,
    status: 200,
    produces: 'text/csv',
  }),
  accept: operation({
    ...shared,
    id: 'acceptImport',
    method: 'post',
    path: '/api/v1/imports/{import}/accept',
    summary: 'Make the checked import a snapshot',
    params: one,
    status: 200,
    response: importSchema,
  }),
  discard: operation({
    ...shared,
    id: 'discardImport',
    method: 'post',
    path: '/api/v1/imports/{import}/discard',
    summary: 'Discard a checked import; nothing is kept',
    params: one,
    status: 200,
    response: importSchema,
  }),
};
