/**
 * Complementary error function to about 1e-14 relative, tails included: the power series below 1, where nothing
 * cancels, the continued fraction by Lentz's method above (Abramowitz & Stegun 1964, 7.1.6 and 7.1.14).
 */
export function erfc(x: number): number {
  if (x < 0) return 2 - erfc(-x);
  if (x === Infinity) return 0;
  if (x < 1) {
    // erf(x) = 2/√π e^{−x²} Σ 2^k x^{2k+1} / (1·3·…·(2k+1))
    let term = x;
    let sum = x;
    for (let k = 1; k < 200 && term > 1e-17 * sum; k++) {
      term *= (2 * x * x) / (2 * k + 1);
      sum += term;
    }
    return 1 - (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x) * sum;
  }
  // √π e^{x²} erfc(x) = 1/(x + (1/2)/(x + 1/(x + (3/2)/(x + …))))
  let f = x;
  let c = x;
  let d = 0;
  for (let k = 1; k < 500; k++) {
    const a = k / 2;
    d = 1 / (x + a * d);
    c = x + a / c;
    const step = c * d;
    f *= step;
    if (Math.abs(step - 1) < 1e-16) break;
  }
  return Math.exp(-x * x) / (Math.sqrt(Math.PI) * f);
}

/** Two-sided p of a standard normal z; exact down to the smallest doubles, 0 for infinite z, NaN for NaN. */
export const twoSidedP = (z: number): number => Math.min(1, erfc(Math.abs(z) / Math.SQRT2));
