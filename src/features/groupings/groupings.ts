import * as z from 'zod';
import { idSchema } from '@/lib/ids';

export const METHODS = ['fiedler', 'spectral', 'louvain'] as const;
export const LAPLACIANS = ['combinatorial', 'normalised', 'regularised'] as const;
export const CUTS = ['sign', 'median', 'sweep'] as const;

/** Most groups that can be asked for at once. */
export const MOST_GROUPS = 50;

/** 32-bit seeds: what the generator uses. */
export const seedSchema = z.int().min(-2_147_483_648).max(2_147_483_647).default(1);

export const makeGroupingSchema = z
  .object({
    name: z.string().trim().min(1).max(120).optional(),
    /** Split in two, k groups at once, or the second opinion. */
    method: z.enum(METHODS).default('fiedler'),
    laplacian: z.enum(LAPLACIANS).default('regularised'),
    cut: z.enum(CUTS).default('sweep'),
    k: z.union([z.int().min(2).max(MOST_GROUPS), z.literal('auto')]).default('auto'),
    /** Regularisation; the mean strength where left out. */
    tau: z.number().positive().optional(),
    seed: seedSchema,
    /** Split only one group of an earlier grouping; the other groups stay as they are. */
    within: z.object({ grouping: idSchema, group: z.int().min(0) }).optional(),
    minimumSize: z.int().min(1).optional(),
  })
  .refine((body) => !body.within || body.method === 'fiedler', {
    path: ['within'],
    message: 'Only a split in two can be made within a group.',
  });
export type MakeGrouping = z.output<typeof makeGroupingSchema>;

export const changeGroupingSchema = z
  .object({
    name: z.string().trim().min(1).max(120).optional(),
    /** An empty name takes the name away; the letter stays. */
    groups: z
      .array(z.object({ index: z.int().min(0), name: z.string().trim().max(80) }))
      .max(1_000)
      .optional(),
  })
  .refine((body) => body.name !== undefined || body.groups !== undefined, {
    message: 'Send a name or names of groups.',
  });
export type ChangeGrouping = z.output<typeof changeGroupingSchema>;

const number = z.number().nullable();

export const profileEntrySchema = z.object({
  attribute: z.string(),
  /** Mean of the group minus the mean of all, in standard deviations of all. */
  difference: z.number(),
  /** Standard error of `difference`. */
  error: z.number(),
  /** Members of the group with a score. */
  count: z.int(),
});

export const groupSchema = z
  .object({
    index: z.int(),
    letter: z.string(),
    name: z.string().nullable(),
    /** True while the name is the one proposed from a label attribute. */
    proposed: z.boolean(),
    size: z.int(),
    cut: number,
    volume: number,
    conductance: number,
    density: number,
    /** A component of its own, not cut from the rest. */
    islet: z.boolean(),
    /** Share of the group's ties that lead out of it, by weight. */
    leaving: number,
    profile: z.array(profileEntrySchema),
  })
  .meta({ id: 'Group' });
export type Group = z.infer<typeof groupSchema>;

export const boundarySchema = z.object({
  ordinal: z.int(),
  group: z.int(),
  other: z.int(),
  inside: z.number(),
  across: z.number(),
});
export type Boundary = z.infer<typeof boundarySchema>;

const memberReference = {
  id: z.string(),
  externalId: z.string().nullable(),
  name: z.string().nullable(),
  code: z.string().nullable(),
};

/** What a finished grouping holds besides the row itself. */
export const groupingResultSchema = z.object({
  eigenvalues: z.array(z.number()),
  residuals: z.array(z.number()),
  /** Gaps after each number of groups, for the question "how many groups?"; null where it does not arise. */
  gaps: z.array(z.object({ k: z.int(), gap: z.number() })).nullable(),
  modularity: number,
  normalisedCut: number,
  cheeger: z.object({ lower: z.number(), upper: z.number() }).nullable(),
  tau: number,
  groups: z.array(groupSchema),
  scope: z.object({ members: z.int(), component: z.int().nullable() }),
  /** Ties between groups (weight), and the same per 1,000 possible pairs by number of ties. */
  between: z.object({ weights: z.array(z.array(z.number())), perThousand: z.array(z.array(number)) }),
  seconds: z.number(),
  source: z.string(),
  notes: z.array(z.string()),
});
export type GroupingResult = z.infer<typeof groupingResultSchema>;

export const groupingSchema = groupingResultSchema
  .extend({
    id: z.string(),
    communityId: z.string(),
    snapshotId: z.string(),
    name: z.string(),
    state: z.enum(['queued', 'ready', 'failed']),
    method: z.enum(METHODS),
    laplacian: z.enum(LAPLACIANS),
    cut: z.enum(CUTS).nullable(),
    k: z.int().nullable(),
    seed: z.int(),
    options: z.record(z.string(), z.unknown()),
    boundary: z.array(boundarySchema.omit({ ordinal: true }).extend(memberReference)),
    version: z.string(),
    createdAt: z.string(),
    createdBy: z.string().nullable(),
    finishedAt: z.string().nullable(),
    href: z.string(),
    /** The job that is making it, while it is not ready. */
    job: z.string().nullable(),
  })
  .meta({ id: 'Grouping' });
export type GroupingView = z.infer<typeof groupingSchema>;

export const groupingSummarySchema = z
  .object({
    id: z.string(),
    name: z.string(),
    state: z.enum(['queued', 'ready', 'failed']),
    method: z.enum(METHODS),
    laplacian: z.enum(LAPLACIANS),
    cut: z.enum(CUTS).nullable(),
    k: z.int().nullable(),
    seed: z.int(),
    modularity: number,
    createdAt: z.string(),
    createdBy: z.string().nullable(),
    groups: z.array(groupSchema.pick({ index: true, letter: true, name: true, size: true, islet: true })),
    href: z.string(),
    /** The job that is making it, while it runs. */
    job: z.string().nullable(),
  })
  .meta({ id: 'GroupingSummary' });
export type GroupingSummary = z.infer<typeof groupingSummarySchema>;

export const groupingMemberSchema = z
  .object({ ...memberReference, group: z.int().nullable(), vector: number })
  .meta({ id: 'GroupingMember' });
export type GroupingMemberView = z.infer<typeof groupingMemberSchema>;

export const comparisonSchema = z
  .object({
    adjustedRand: number,
    /** Arithmetic mean of the two entropies. */
    normalisedMutualInformation: number,
    members: z.int(),
    table: z.object({
      rows: z.array(z.string()),
      columns: z.array(z.string()),
      counts: z.array(z.array(z.int())),
    }),
  })
  .meta({ id: 'Comparison' });
export type Comparison = z.infer<typeof comparisonSchema>;
