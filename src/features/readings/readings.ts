import * as z from 'zod';
import { readingFilterSchema } from './filter';

const LAPLACIANS = ['combinatorial', 'normalised', 'regularised'] as const;

export const makeReadingSchema = z.object({
  /** Name or id of a numeric attribute of the snapshot. */
  attribute: z.string().min(1).max(200),
  filter: readingFilterSchema.default({ kind: 'two-level' }),
  laplacian: z.enum(LAPLACIANS).default('combinatorial'),
  /** Name or id of a count attribute: a score made of more counts weighs more. Null for equal weights. */
  weights: z.string().min(1).max(200).nullable().optional(),
  permutations: z.int().min(0).max(9_999).default(999),
  seed: z.int().min(-2_147_483_648).max(2_147_483_647).default(1),
});
export type MakeReading = z.output<typeof makeReadingSchema>;

const number = z.number().nullable();

const momentsSchema = z.object({
  value: number,
  expectation: number,
  variance: number,
  z: number,
  /** Two-sided, under randomisation. */
  p: number,
  permutationP: number,
  n: z.int(),
});
const bothWeights = z.object({ row: momentsSchema, raw: momentsSchema });

/** Energy of the scores by graph frequency, in bands of neighbouring frequencies. */
export const warpSchema = z.object({
  bands: z.array(
    z.object({
      from: z.number(),
      to: z.number(),
      count: z.int(),
      /** Share of all energy, scores as recorded (missing ones filled in by the smoother). */
      energy: z.number(),
      /** Share of all energy that the smoothed score holds in this band. */
      kept: z.number(),
    }),
  ),
  /** Members and frequencies that were looked at. */
  members: z.int(),
  frequencies: z.int(),
  laplacian: z.enum(LAPLACIANS),
});
export type Warp = z.infer<typeof warpSchema>;

export const readingResultSchema = z.object({
  alpha: number,
  sigma: number,
  /** The likelihood's estimate beside the robust one. */
  sigmaLikelihood: number,
  observed: z.int(),
  missing: z.int(),
  tested: z.int(),
  effectiveDegrees: number,
  moran: bothWeights.nullable(),
  geary: bothWeights.nullable(),
  smoothness: z.object({ quadratic: number, rayleigh: number }).nullable(),
  explained: number,
  /** Median distance between a score and what its neighbourhood predicts. */
  typical: number,
  /** Largest relative residual of the linear solves. */
  residual: number,
  method: z.string(),
  /** Members with q at or below 10 %. */
  flagged: z.int(),
  /** Groups whose levels the default smoother used; null for the other smoothers. */
  levels: z.int().nullable(),
  warp: warpSchema.nullable(),
  notes: z.array(z.string()),
  seconds: z.number(),
});
export type ReadingSummaryResult = z.infer<typeof readingResultSchema>;

export const readingSchema = readingResultSchema
  .partial({ warp: true })
  .extend({
    id: z.string(),
    communityId: z.string(),
    snapshotId: z.string(),
    state: z.enum(['queued', 'ready', 'failed']),
    attribute: z.string(),
    attributeId: z.string(),
    sensitive: z.boolean(),
    filter: z.record(z.string(), z.unknown()),
    laplacian: z.enum(LAPLACIANS),
    options: z.record(z.string(), z.unknown()),
    seed: z.int(),
    version: z.string(),
    createdAt: z.string(),
    createdBy: z.string().nullable(),
    finishedAt: z.string().nullable(),
    href: z.string(),
    /** The job that is making it, while it is not ready. */
    job: z.string().nullable(),
  })
  .meta({ id: 'Reading' });
export type ReadingView = z.infer<typeof readingSchema>;

export const readingLineSchema = z
  .object({
    id: z.string(),
    state: z.enum(['queued', 'ready', 'failed']),
    attribute: z.string(),
    attributeId: z.string(),
    filter: z.record(z.string(), z.unknown()),
    laplacian: z.enum(LAPLACIANS),
    seed: z.int(),
    moran: number,
    explained: number,
    flagged: z.int().nullable(),
    observed: z.int().nullable(),
    missing: z.int().nullable(),
    createdAt: z.string(),
    createdBy: z.string().nullable(),
    href: z.string(),
    job: z.string().nullable(),
  })
  .meta({ id: 'ReadingLine' });
export type ReadingLine = z.infer<typeof readingLineSchema>;

export const readingMemberSchema = z
  .object({
    id: z.string(),
    externalId: z.string().nullable(),
    name: z.string().nullable(),
    code: z.string().nullable(),
    value: number,
    smoothed: number,
    standardError: number,
    departure: number,
    leverage: number,
    z: number,
    p: number,
    q: number,
    observed: z.boolean(),
    tested: z.boolean(),
    neighbours: z.int(),
    localMoran: z.object({
      I: number,
      expectation: number,
      variance: number,
      z: number,
      p: number,
      q: number,
      /** By conditional permutation, two-sided, by the +1 rule; q is that of the moments’ p. */
      permutationP: number,
      quadrant: z.enum(['HH', 'LL', 'HL', 'LH']).nullable(),
    }),
    /** Group in the newest grouping of the snapshot, and an undecided or decided case about this reading. */
    group: z.object({ letter: z.string(), name: z.string().nullable() }).nullable(),
    case: z.object({ id: z.string(), state: z.string(), decision: z.string().nullable() }).nullable(),
  })
  .meta({ id: 'ReadingMember' });
export type ReadingMemberView = z.infer<typeof readingMemberSchema>;

export const readingMembersQuerySchema = z.object({
  /** Member order, largest departure first, or smallest chance of a false flag first. */
  sort: z.enum(['order', 'departure', 'q']).default('order'),
  /** Only members whose q is at most this. */
  maximumQ: z.coerce.number().min(0).max(1).optional(),
  limit: z.coerce.number().int().min(1).max(10_000).default(1_000),
  cursor: z.string().max(40).optional(),
});
export type ReadingMembersQuery = z.output<typeof readingMembersQuerySchema>;
