import type { Problem } from './model';

/** Diagonal of the chosen Laplacian of a problem, length n. */
export function diagonalOf({ l }: Problem): Float64Array {
  const { network, kind, tau, n } = l;
  return Float64Array.from({ length: n }, (_, i) => {
    const d = network.strength[i]!;
    if (kind === 'combinatorial') return d;
    if (kind === 'normalised') return d > 0 ? 1 : 0;
    return 1 - tau / n / (d + tau);
  });
}
