import * as z from 'zod';
import { idSchema } from '@/lib/ids';
import { operation } from '@/lib/operation';
import { readSettingsSchema } from '@/features/files';
import { acceptedSchema } from '@/features/jobs';

export const ROLES = ['ties', 'members', 'mapping'] as const;
export type FileRole = (typeof ROLES)[number];

/** What one import may hold; configured, said before the upload and enforced while streaming. */
export interface ImportLimits {
  readonly fileBytes: number;
  /** After unpacking gzip. */
  readonly textBytes: number;
  readonly tieRows: number;
  readonly memberRows: number;
  readonly columns: number;
  readonly cells: number;
  readonly cellLength: number;
  readonly idLength: number;
  readonly labelLength: number;
  /** Refused rows kept with their reason; all are counted. */
  readonly problems: number;
}

/** Limits that no configuration changes: they keep rows and pages readable. */
export const FIXED_LIMITS = {
  cells: 20_000_000,
  cellLength: 10_000,
  idLength: 200,
  labelLength: 200,
  problems: 100_000,
} as const;

const columnName = z.string().min(1).max(500);

const attributeSchema = z.object({
  column: columnName,
  name: z.string().trim().min(1).max(120),
  /** A date becomes the months from it to the day of the snapshot. */
  type: z.enum(['number', 'label', 'date']).optional(),
  direction: z.enum(['higher-better', 'higher-worse', 'neither']).default('neither'),
  sensitive: z.boolean().default(false),
  countColumn: columnName.optional(),
  /** Numbers outside are refused, cell by cell. */
  least: z.number().optional(),
  most: z.number().optional(),
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
    .object({ id: columnName, name: columnName, attributes: z.array(attributeSchema).max(10_000) })
    .partial()
    .default({}),
  directions: z.enum(['sum', 'larger', 'mutual']).default('sum'),
  repeats: z.enum(['sum', 'count', 'largest']).default('sum'),
  logWeight: z.boolean().default(false),
  halfLifeDays: z.number().positive().max(100_000).nullable().default(null),
  minimumWeight: z.number().nonnegative().nullable().default(null),
  /** What becomes of members without a tie. */
  loners: z.enum(['keep', 'leave-out']).default('keep'),
  /** `changes`: the files hold only what is new since `base`, by default the newest snapshot. */
  mode: z.enum(['full', 'changes']).default('full'),
  base: idSchema.optional(),
  /** Columns of the file of changed ids. */
  mapping: z.object({ old: columnName, new: columnName }).partial().default({}),
  /** How each file is read; what is left out is detected. */
  reading: z
    .object({ ties: readSettingsSchema, members: readSettingsSchema, mapping: readSettingsSchema })
    .partial()
    .default({}),
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
    /** Members without a tie, left out by choice. */
    leftOut: z.int(),
    blankCells: z.int(),
    refusedCells: z.int(),
  }),
  membersFromTies: z.int(),
  /** Changed ids that were read, and refused. */
  mappingRows: z.object({ read: z.int(), kept: z.int(), refused: z.int() }).optional(),
  /** Taken over from the earlier snapshot, where the files held changes only. */
  carriedOver: z.object({ members: z.int(), ties: z.int() }).optional(),
});
export type ImportCounts = z.infer<typeof countsSchema>;

export const problemSchema = z.object({
  file: z.enum(ROLES),
  line: z.int(),
  column: z.string().nullable(),
  value: z.string().nullable(),
  reason: z.string(),
});
export type ImportProblem = z.infer<typeof problemSchema>;

/** Problems of the same kind: one column, one reason. */
export const problemKindSchema = z.object({
  kind: z.int(),
  file: z.enum(ROLES),
  column: z.string().nullable(),
  reason: z.string(),
  count: z.int(),
  firstLine: z.int(),
});
export type ProblemKind = z.infer<typeof problemKindSchema>;

export const warningSchema = z.object({ code: z.string(), text: z.string() });
export type ImportWarning = z.infer<typeof warningSchema>;

export const importSchema = z
  .object({
    id: z.string(),
    communityId: z.string(),
    state: z.enum(['received', 'checking', 'review', 'accepted', 'discarded', 'failed', 'cancelled']),
    files: z.array(z.object({ role: z.enum(ROLES), name: z.string(), bytes: z.number() })),
    options: z.record(z.string(), z.unknown()),
    counts: countsSchema.nullable(),
    warnings: z.array(warningSchema),
    problems: z.array(problemSchema),
    problemsTotal: z.int(),
    problemKinds: z.array(problemKindSchema),
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
  problemPage: operation({
    ...shared,
    id: 'importProblemPage',
    method: 'get',
    path: '/api/v1/imports/{import}/problems',
    summary: 'Refused rows of one kind, a page at a time',
    params: one,
    query: z.object({
      kind: z.coerce.number().int().nonnegative(),
      limit: z.coerce.number().int().min(1).max(1000).default(100),
      cursor: z.coerce.number().int().nonnegative().default(0),
    }),
    status: 200,
    response: z.object({ items: z.array(problemSchema), nextCursor: z.string().nullable() }),
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
