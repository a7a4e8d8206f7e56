/**
 * False-discovery q of each p (Benjamini & Hochberg 1995): the smallest rate at which it would be rejected.
 * NaN entries were not tested and stay NaN.
 */
export function benjaminiHochberg(p: Float64Array): Float64Array {
  const q = new Float64Array(p.length).fill(NaN);
  const tested = Array.from(p.keys()).filter((i) => !Number.isNaN(p[i]!));
  tested.sort((a, b) => p[b]! - p[a]! || b - a);
  let lowest = 1;
  tested.forEach((i, from) => {
    const rank = tested.length - from;
    lowest = Math.min(lowest, (p[i]! * tested.length) / rank);
    q[i] = lowest;
  });
  return q;
}

/** Median of the finite values; NaN without any. */
export function median(values: ArrayLike<number>): number {
  const sorted = Float64Array.from(values).filter(Number.isFinite).sort();
  if (sorted.length === 0) return NaN;
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half]! : (sorted[half - 1]! + sorted[half]!) / 2;
}
