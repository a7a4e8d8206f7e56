import type { LaplacianOperator } from '../operators';

/** One smoothing problem on members that can be estimated: those of components with an observed member. */
export interface Problem {
  readonly l: LaplacianOperator;
  /** 1 where a value is observed. */
  readonly observed: Uint8Array;
  /** Values; 0 where missing. */
  readonly y: Float64Array;
  /** Precision weights > 0 where observed, 0 where missing. */
  readonly s: Float64Array;
  /** Group of each member for the levels, or null for a smoother without levels. */
  readonly groups: Int32Array | null;
  /** Number of components: constants that the penalty leaves free. */
  readonly nullity: number;
}

/** A fit: everything that follows is on all members of the problem, in their order. */
export interface Fit {
  readonly alpha: number;
  readonly smoothed: Float64Array;
  /** Variance of the smoothed score over σ². */
  readonly variance: Float64Array;
  /** Diagonal of the whole linear smoother; 0 for members without weight. */
  readonly leverage: Float64Array;
  /** 1 where the leverage is exact. */
  readonly exact: Uint8Array;
  /** Penalised residual sum of squares and its degrees of freedom: σ̂² by restricted likelihood is their ratio. */
  readonly quadratic: number;
  readonly degrees: number;
  /** Largest relative residual of the linear solves; 0 where none were iterative. */
  readonly residual: number;
}

/** Indicator columns of groups that have an observed, weighted member; the others follow their ties alone. */
export function groupColumns(groups: Int32Array | null, weights: Float64Array): Float64Array[] {
  if (!groups) return [];
  const seen = new Set<number>();
  groups.forEach((group, i) => {
    if (group >= 0 && weights[i]! > 0) seen.add(group);
  });
  if (seen.size < 2) return [];
  return [...seen]
    .sort((a, b) => a - b)
    .map((group) => Float64Array.from(groups, (one) => (one === group ? 1 : 0)));
}
