/** Coefficients of Lanczos 1964 for g = 7 with nine terms (Godfrey 2001): about 15 digits of Γ. */
const LANCZOS = [
  0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
  12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
] as const;

/** log Γ(a), a > 0, by Lanczos's approximation. */
function logGamma(a: number): number {
  if (a < 0.5) return Math.log(Math.PI / Math.sin(Math.PI * a)) - logGamma(1 - a);
  const t = a + 6.5;
  let sum: number = LANCZOS[0];
  for (let k = 1; k < LANCZOS.length; k++) sum += LANCZOS[k]! / (a - 1 + k);
  return 0.5 * Math.log(2 * Math.PI) + (a - 0.5) * Math.log(t) - t + Math.log(sum);
}

/**
 * Regularised incomplete gamma functions P(a, x) = γ(a, x)/Γ(a) and Q = 1 − P, each to about 1e-13 relative where it is
 * the smaller of both: the power series below a + 1 (NIST DLMF 8.11.4), the continued fraction by Lentz's method above
 * (DLMF 8.9.2).
 * @param a shape, positive
 * @param x 0 or more; Infinity gives P = 1
 */
export function incompleteGamma(a: number, x: number): { readonly P: number; readonly Q: number } {
  if (x <= 0) return { P: 0, Q: 1 };
  if (x === Infinity) return { P: 1, Q: 0 };
  const front = Math.exp(a * Math.log(x) - x - logGamma(a));
  const most = 10_000 + Math.ceil(10 * Math.sqrt(a));
  if (x < a + 1) {
    let term = 1 / a;
    let sum = term;
    for (let k = 1; k < most && term > 1e-17 * sum; k++) {
      term *= x / (a + k);
      sum += term;
    }
    const P = Math.min(1, front * sum);
    return { P, Q: 1 - P };
  }
  let b = x + 1 - a;
  let c = 1e300;
  let d = 1 / b;
  let f = d;
  for (let k = 1; k < most; k++) {
    const step = k * (a - k);
    b += 2;
    d = 1 / (b + step * d);
    c = b + step / c;
    f *= c * d;
    if (Math.abs(c * d - 1) < 1e-16) break;
  }
  const Q = Math.min(1, front * f);
  return { P: 1 - Q, Q };
}

/** P(χ²_k > x): the upper tail of chi-squared with k degrees of freedom (Abramowitz & Stegun 1964, 26.4.19). */
export const chiSquaredP = (x: number, k: number): number => incompleteGamma(k / 2, x / 2).Q;

/** The x with P(χ²_k ≤ x) = share, 0 < share < 1, by bisection to the last digits. */
export function chiSquaredQuantile(share: number, k: number): number {
  let low = 0;
  let high = 2 * k + 10;
  while (incompleteGamma(k / 2, high / 2).P < share) high *= 2;
  for (let round = 0; round < 200 && high - low > 1e-15 * high; round++) {
    const middle = (low + high) / 2;
    if (incompleteGamma(k / 2, middle / 2).P < share) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
