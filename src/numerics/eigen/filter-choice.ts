import type { LaplacianOperator } from '../operators';
import { growthAt, type Filter } from './filter';

/**
 * Degree of the filter: as high as makes products outweigh the orthogonalisation of one step, and high enough for some
 * growth on a small gap, but with an amplification of the lowest value of at most about e⁷, beyond which the higher
 * wanted vectors lose digits. Every further degree costs products, as a filter is a worse polynomial than Lanczos's own.
 */
export function chooseDegree(
  op: LaplacianOperator,
  low: number,
  cut: number,
  top: number,
  capacity: number,
): number {
  const growth = growthAt(low, cut, top);
  const byWork = Math.ceil(1 + capacity / (2 * (op.entriesPerRow + 2)));
  const byGap = Math.ceil(1 / growth);
  return Math.max(2, Math.min(Math.max(byWork, byGap), Math.ceil(7 / growth), 100));
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
