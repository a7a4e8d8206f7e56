import type { LaplacianOperator } from '../operators';
import { growthAt, type Filter } from './filter';

/**
 * Degree of the filter: high enough for the last wanted value to stand out of the unwanted ones, and for products to
 * weigh as much as the orthogonalisation of one step; but with an amplification of the lowest value of at most
 * about e¹⁰, beyond which the higher wanted vectors lose digits that the tolerance asks for.
 *
 * @param wanted an estimate of the last wanted value, below the cut
 */
export function chooseDegree(
  op: LaplacianOperator,
  low: number,
  wanted: number,
  cut: number,
  top: number,
  capacity: number,
): number {
  // Bytes moved for one row: the basis twice, mostly three quarters full, against the matrix and its vectors.
  const byWork = Math.ceil((12 * capacity) / (12 * op.entriesPerRow + 40));
  const byGap = Math.ceil(1.2 / growthAt(Math.min(wanted, cut), cut, top));
  const ceiling = Math.ceil(10 / growthAt(low, cut, top));
  return Math.max(2, Math.min(Math.max(byWork, byGap), ceiling, 100));
}

/**
 * A better end of the unwanted interval once a cycle has shown where the unwanted Ritz values lie, or null
 * when the present filter converges nearly as fast per product as the best one would.
 */
export function nextCut(filter: Filter, values: Float64Array, count: number, keep: number): number | null {
  const wanted = values[count - 1]!;
  const unwanted = values[Math.min(keep, values.length - 1)]!;
  if (!(unwanted > 1 && wanted > 1)) return null;
  const gap = Math.max(0, (wanted - unwanted) / (unwanted + 1));
  const now = Math.acosh(1 + 2 * gap) / filter.degree;
  const cut = filter.inverse(unwanted);
  const lambda = filter.inverse(wanted);
  const possible = Math.acosh(1 + (2 * Math.max(0, cut - lambda)) / (filter.top - cut));
  return possible > 1.5 * now && cut < 0.8 * filter.cut ? cut : null;
}
