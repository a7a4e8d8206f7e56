import type { LaplacianOperator } from '../operators';

/**
 * A Chebyshev polynomial of a Laplacian, T_d((c − A)/e): between −1 and 1 on the unwanted interval [a, b],
 * growing fast below a. Its largest eigenvalues belong to the smallest of A (Saad 1984; Zhou & Saad 2007).
 */
export interface Filter {
  readonly degree: number;
  readonly cut: number;
  readonly top: number;
  /** Growth per degree at the lowest wanted λ: p(λ) ≈ e^{growth · degree} / 2. */
  readonly growth: number;
  /** p(λ). */
  at(lambda: number): number;
  /** The λ ≤ a with p(λ) = value, for value ≥ 1. */
  inverse(value: number): number;
  /** |p′(λ)| at the λ ≤ a with p(λ) = value, for value ≥ 1. */
  slope(value: number): number;
  /** out = p(A) x; x is kept. */
  apply(x: Float64Array, out: Float64Array): void;
}

/**
 * @param low the lowest wanted λ, by which `growth` is measured
 * @param spare a vector that `apply` may use
 */
export function chebyshevFilter(
  op: LaplacianOperator,
  cut: number,
  top: number,
  low: number,
  degree: number,
  spare: Float64Array,
): Filter {
  const centre = (cut + top) / 2;
  const half = (top - cut) / 2;
  return {
    degree,
    cut,
    top,
    growth: growthAt(low, cut, top),
    at: (lambda) => chebyshev(degree, (centre - lambda) / half),
    inverse: (value) => centre - half * Math.cosh(Math.acosh(Math.max(1, value)) / degree),
    slope: (value) => {
      const t = Math.acosh(Math.max(1, value)) / degree;
      // T_d′(cosh t) = d sinh(d t) / sinh t, which tends to d² at t = 0.
      return (t < 1e-9 ? degree * degree : (degree * Math.sinh(degree * t)) / Math.sinh(t)) / half;
    },
    apply: (x, out) => {
      // T_0 x = x, T_1 x = (c x − A x)/e, T_{j+1} = 2 (c − A)/e T_j − T_{j−1}; the last term lands in `out`.
      let before = x;
      let current = degree % 2 === 1 ? out : spare;
      op.combine(x, x, -1 / half, centre / half, 0, current);
      for (let j = 2; j <= degree; j++) {
        const next = current === out ? spare : out;
        op.combine(current, before, -2 / half, (2 * centre) / half, -1, next);
        before = current;
        current = next;
      }
    },
  };
}

/** T_d(x) for any real x. */
export function chebyshev(degree: number, x: number): number {
  if (Math.abs(x) <= 1) return Math.cos(degree * Math.acos(x));
  const grown = Math.cosh(degree * Math.acosh(Math.abs(x)));
  return x < 0 && degree % 2 === 1 ? -grown : grown;
}

/** arccosh of the mapped λ: the rate at which T_d grows with d below the unwanted interval. */
export function growthAt(lambda: number, cut: number, top: number): number {
  return Math.acosh(Math.max(1 + 1e-12, (cut + top - 2 * lambda) / (top - cut)));
}
