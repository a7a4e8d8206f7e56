import { UnanswerableError, type Network } from '../types';
import { strengths } from './build';

/**
 * Revives a network that was stored as compressed sparse rows, with checks that cost one pass:
 * shapes, row order, index range, zero diagonal, finite positive weights. Symmetry is checked too,
 * by walking the rows in order (every entry (i, j) must be met as (j, i) with the same weight).
 *
 * @throws UnanswerableError `bad-network` when the arrays are not such a matrix
 */
export function fromCsr(offsets: Int32Array, targets: Int32Array, weights: Float64Array): Network {
  const n = offsets.length - 1;
  const refuse = (reason: string): never => {
    throw new UnanswerableError('bad-network', `The stored network is damaged: ${reason}.`);
  };
  if (n < 0 || offsets[0] !== 0 || offsets[n] !== targets.length || targets.length !== weights.length)
    refuse('its lengths do not fit');
  for (let i = 0; i < n; i++) if (offsets[i + 1]! < offsets[i]!) refuse('its rows overlap');
  const cursor = offsets.slice(0, n);
  for (let i = 0; i < n; i++) {
    let before = -1;
    for (let p = offsets[i]!; p < offsets[i + 1]!; p++) {
      const j = targets[p]!;
      const w = weights[p]!;
      if (!(j > before && j < n) || j === i) refuse(`row ${i} is not sorted`);
      before = j;
      if (!(w > 0) || w === Infinity) refuse(`row ${i} holds the weight ${w}`);
      // Rows are visited in order, so the mirror of (i, j) is the next entry of row j not yet met.
      const q = cursor[j]!++;
      if (q >= offsets[j + 1]! || targets[q] !== i || weights[q] !== w)
        refuse(`tie ${i}–${j} differs between its directions`);
    }
  }
  return { n, offsets, targets, weights, strength: strengths(n, offsets, weights) };
}

/** Number of distinct ties m. */
export const tieCount = (net: Network): number => net.targets.length / 2;

/** Total weight of all ties, Σ_{i<j} w_ij = vol / 2. */
export function totalWeight(net: Network): number {
  let sum = 0;
  for (let i = 0; i < net.n; i++) sum += net.strength[i]!;
  return sum / 2;
}
