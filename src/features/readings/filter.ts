import * as z from 'zod';

const positive = z.number().positive().max(1e12);
const frequency = z.number().min(0).max(1e12);
const keep = z.int().min(1).max(2_000);

/** How the smoothed score is made; strengths and cut-offs are in the chosen Laplacian's own units. */
export const readingFilterSchema = z.union(
  [
    z.strictObject({ kind: z.literal('two-level'), groups: z.int().min(1).max(50).optional() }),
    z.strictObject({ kind: z.literal('tikhonov'), alpha: z.union([positive, z.enum(['gcv', 'hold-out'])]) }),
    z.strictObject({ kind: z.literal('heat'), tau: positive }),
    z.strictObject({ kind: z.enum(['low-pass', 'high-pass']), cutoff: frequency }),
    z.strictObject({ kind: z.enum(['low-pass', 'high-pass']), keep }),
    z
      .strictObject({ kind: z.literal('band-pass'), from: frequency, to: frequency })
      .refine((band) => band.to >= band.from, { path: ['to'], message: 'The band ends before it begins.' }),
  ],
  { error: 'Use one kind of filter with its own settings, such as { "kind": "tikhonov", "alpha": 1 }.' },
);
export type ReadingFilter = z.output<typeof readingFilterSchema>;
