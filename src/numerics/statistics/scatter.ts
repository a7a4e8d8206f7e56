/** Mean and covariance of some rows, with the Cholesky factor of the covariance. */
export interface Scatter {
  /** Length k. */
  readonly centre: Float64Array;
  /** k × k, row-major. */
  readonly covariance: Float64Array;
  /** Lower triangle G of covariance = G Gᵀ, row-major. */
  readonly factor: Float64Array;
  readonly logDeterminant: number;
}

/** A covariance that is not of full rank: the column that adds nothing to those before it. */
export interface Singular {
  readonly column: number;
  /** Whether it does not vary at all, rather than being a combination of the others. */
  readonly constant: boolean;
}

export const isSingular = (found: Scatter | Singular): found is Singular => 'column' in found;

/** Share of a column's variance that must be left beside the columns before it. */
const RANK = 1e-12;

/**
 * Mean and covariance (divisor count − 1) of chosen rows.
 * @param rows n × k, row-major, columns of about the same size
 * @param chosen row indexes, at least two
 */
export function scatterOf(rows: Float64Array, k: number, chosen: Int32Array): Scatter | Singular {
  const centre = new Float64Array(k);
  for (const i of chosen) for (let a = 0; a < k; a++) centre[a]! += rows[i * k + a]! / chosen.length;
  const covariance = new Float64Array(k * k);
  const off = new Float64Array(k);
  for (const i of chosen) {
    for (let a = 0; a < k; a++) off[a] = rows[i * k + a]! - centre[a]!;
    for (let a = 0; a < k; a++) for (let b = 0; b <= a; b++) covariance[a * k + b]! += off[a]! * off[b]!;
  }
  for (let a = 0; a < k; a++)
    for (let b = 0; b <= a; b++) {
      covariance[a * k + b]! /= chosen.length - 1;
      covariance[b * k + a] = covariance[a * k + b]!;
    }
  return factorised(centre, covariance);
}

/** The same from a mean and a covariance that are there already. */
export function factorised(centre: Float64Array, covariance: Float64Array): Scatter | Singular {
  const k = centre.length;
  const factor = new Float64Array(k * k);
  let logDeterminant = 0;
  for (let a = 0; a < k; a++) {
    const own = covariance[a * k + a]!;
    let pivot = own;
    for (let b = 0; b < a; b++) {
      let sum = covariance[a * k + b]!;
      for (let c = 0; c < b; c++) sum -= factor[a * k + c]! * factor[b * k + c]!;
      factor[a * k + b] = sum / factor[b * k + b]!;
      pivot -= factor[a * k + b]! ** 2;
    }
    if (!(own > RANK * RANK)) return { column: a, constant: true };
    if (!(pivot > RANK * own)) return { column: a, constant: false };
    factor[a * k + a] = Math.sqrt(pivot);
    logDeterminant += Math.log(pivot);
  }
  return { centre, covariance, factor, logDeterminant };
}

/** Squared Mahalanobis distance of the k numbers of `rows` from `at` on; `scratch` is of length k. */
export function squaredDistance(
  rows: Float64Array,
  at: number,
  { centre, factor }: Scatter,
  scratch: Float64Array,
): number {
  const k = centre.length;
  let total = 0;
  for (let a = 0; a < k; a++) {
    let sum = rows[at + a]! - centre[a]!;
    for (let b = 0; b < a; b++) sum -= factor[a * k + b]! * scratch[b]!;
    const one = sum / factor[a * k + a]!;
    scratch[a] = one;
    total += one * one;
  }
  return total;
}

/** Squared Mahalanobis distances of all rows. */
export function squaredDistances(rows: Float64Array, scatter: Scatter): Float64Array {
  const k = scatter.centre.length;
  const scratch = new Float64Array(k);
  return Float64Array.from({ length: rows.length / k }, (_, i) =>
    squaredDistance(rows, i * k, scatter, scratch),
  );
}
