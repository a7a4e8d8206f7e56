import { NotConvergedError } from '../types';

/**
 * Eigenvalues of a symmetric tridiagonal matrix by implicit QL with Wilkinson shifts
 * (Bowdler, Martin, Reinsch & Wilkinson 1968), rotations applied to the rows of `z`.
 *
 * @param d diagonal, length n; replaced by the eigenvalues, unordered
 * @param e sub-diagonal in e[0…n − 2]; destroyed
 * @param z n rows of `width` values (row-major), or null; row i becomes the rotated combination that belongs to d[i]
 * @param step called after each eigenvalue with the number found
 * @throws NotConvergedError after 60 sweeps on one eigenvalue
 */
export function tridiagonalEigen(
  d: Float64Array,
  e: Float64Array,
  z: Float64Array | null,
  width: number,
  step?: (found: number) => void,
): void {
  const n = d.length;
  for (let l = 0; l < n; l++) {
    for (let sweep = 0; ; sweep++) {
      let m = l;
      for (; m < n - 1; m++) {
        const size = Math.abs(d[m]!) + Math.abs(d[m + 1]!);
        if (Math.abs(e[m]!) <= Number.EPSILON * size || Math.abs(e[m]!) < 1e-300) break;
      }
      if (m === l) break;
      if (sweep === 60)
        throw new NotConvergedError('The dense eigenvalue iteration did not settle.', Math.abs(e[l]!));
      let g = (d[l + 1]! - d[l]!) / (2 * e[l]!);
      let r = Math.hypot(g, 1);
      g = d[m]! - d[l]! + e[l]! / (g + (g >= 0 ? r : -r));
      let s = 1;
      let c = 1;
      let p = 0;
      let i = m - 1;
      for (; i >= l; i--) {
        const f = s * e[i]!;
        const b = c * e[i]!;
        r = Math.hypot(f, g);
        e[i + 1] = r;
        if (r === 0) {
          d[i + 1]! -= p;
          e[m] = 0;
          break;
        }
        s = f / r;
        c = g / r;
        g = d[i + 1]! - p;
        r = (d[i]! - g) * s + 2 * c * b;
        p = s * r;
        d[i + 1] = g + p;
        g = c * r - b;
        if (z !== null) rotate(z, i * width, width, c, s);
      }
      if (r === 0 && i >= l) continue;
      d[l]! -= p;
      e[l] = g;
      e[m] = 0;
    }
    step?.(l + 1);
  }
}

/** Rotates two neighbouring rows of z, the upper one starting at `at`. */
function rotate(z: Float64Array, at: number, width: number, c: number, s: number): void {
  for (let a = at, b = at + width, end = at + width; a < end; a++, b++) {
    const upper = z[a]!;
    const lower = z[b]!;
    z[b] = s * upper + c * lower;
    z[a] = c * upper - s * lower;
  }
}
