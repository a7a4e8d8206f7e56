import { KernelMemory } from '../kernels';

/** Eight vectors side by side: the entry i of vector v stands at 8 i + v. Lane-wise sums are put into `sums`. */
export const WIDTH = 8;

/**
 * A step of conjugate gradients on eight systems: x += step p, r −= step q.
 * @param inverse the preconditioner's diagonal
 * @param sums 16 numbers out: Σ r² of each system, then Σ r² · inverse
 */
export function advance8(
  step: Float64Array,
  inverse: Float64Array,
  p: Float64Array,
  q: Float64Array,
  x: Float64Array,
  r: Float64Array,
  sums: Float64Array,
): void {
  const memory = KernelMemory.of(x);
  if (memory?.holds(inverse, p, q, r)) return memory.advance8(step, inverse, p, q, x, r, sums);
  sums.fill(0);
  for (let i = 0, at = 0; i < inverse.length; i++) {
    for (let v = 0; v < WIDTH; v++, at++) {
      x[at]! += step[v]! * p[at]!;
      const left = (r[at]! -= step[v]! * q[at]!);
      sums[v]! += left * left;
      sums[WIDTH + v]! += left * left * inverse[i]!;
    }
  }
}

/** The next directions of eight systems: p = inverse · r + factor p. */
export function direct8(factor: Float64Array, inverse: Float64Array, r: Float64Array, p: Float64Array): void {
  const memory = KernelMemory.of(p);
  if (memory?.holds(inverse, r)) return memory.direct8(factor, inverse, r, p);
  for (let i = 0, at = 0; i < inverse.length; i++)
    for (let v = 0; v < WIDTH; v++, at++) p[at] = inverse[i]! * r[at]! + factor[v]! * p[at]!;
}
