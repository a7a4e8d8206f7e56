const GOLDEN = (Math.sqrt(5) - 1) / 2;

/**
 * Smallest value of a function of log₁₀ α: a grid of half decades, then golden section around the best.
 * @param low, high range of log₁₀ α, half decades apart
 * @param precision of log₁₀ α
 * @returns the place, and whether it lies at an end of the range
 */
export function searchStrength(
  of: (alpha: number) => number,
  low: number,
  high: number,
  precision = 1e-4,
): { alpha: number; end: 'low' | 'high' | null } {
  const steps = Math.round((high - low) * 2);
  let best = 0;
  let lowest = Infinity;
  for (let k = 0; k <= steps; k++) {
    const value = of(10 ** (low + k / 2));
    if (value < lowest) {
      lowest = value;
      best = k;
    }
  }
  if (best === 0) return { alpha: 10 ** low, end: 'low' };
  if (best === steps) return { alpha: 10 ** high, end: 'high' };
  let a = low + (best - 1) / 2;
  let b = low + (best + 1) / 2;
  let c = b - GOLDEN * (b - a);
  let d = a + GOLDEN * (b - a);
  let fc = of(10 ** c);
  let fd = of(10 ** d);
  while (b - a > precision) {
    if (fc < fd) {
      b = d;
      d = c;
      fd = fc;
      c = b - GOLDEN * (b - a);
      fc = of(10 ** c);
    } else {
      a = c;
      c = d;
      fc = fd;
      d = a + GOLDEN * (b - a);
      fd = of(10 ** d);
    }
  }
  return { alpha: 10 ** ((a + b) / 2), end: null };
}
