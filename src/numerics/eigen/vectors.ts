import { KernelMemory } from '../kernels';
import type { Random } from '../random';
import type { Supply } from './supply';

/**
 * Dense vector kernels; all arrays in one call have the same length. Where all of them lie in one kernel memory, compiled
 * code does the work; otherwise the plain loops below, which differ by rounding only.
 */
export function dot(x: Float64Array, y: Float64Array): number {
  const memory = KernelMemory.of(x);
  if (memory?.holds(y)) return memory.dot(x, y);
  let a = 0;
  let b = 0;
  const n = x.length;
  let i = 0;
  for (; i + 1 < n; i += 2) {
    a += x[i]! * y[i]!;
    b += x[i + 1]! * y[i + 1]!;
  }
  if (i < n) a += x[i]! * y[i]!;
  return a + b;
}

export const norm = (x: Float64Array): number => Math.sqrt(dot(x, x));

export function axpy(alpha: number, x: Float64Array, y: Float64Array): void {
  const memory = KernelMemory.of(y);
  if (memory?.holds(x)) return memory.combine([x], 1, [1], alpha, y);
  for (let i = 0; i < x.length; i++) y[i]! += alpha * x[i]!;
}

export function scale(x: Float64Array, alpha: number): void {
  for (let i = 0; i < x.length; i++) x[i]! *= alpha;
}

/** Coefficients h_c = basis_cᵀ w for c < count, four basis vectors a pass so that w is read a quarter as often. */
export function project(
  basis: readonly Float64Array[],
  count: number,
  w: Float64Array,
  h: Float64Array,
): void {
  const memory = KernelMemory.of(w);
  if (memory?.holdsAll(basis, count)) return memory.project(basis, count, w, h);
  const n = w.length;
  let c = 0;
  for (; c + 3 < count; c += 4) {
    const p = basis[c]!;
    const q = basis[c + 1]!;
    const r = basis[c + 2]!;
    const s = basis[c + 3]!;
    let hp = 0;
    let hq = 0;
    let hr = 0;
    let hs = 0;
    for (let i = 0; i < n; i++) {
      const x = w[i]!;
      hp += p[i]! * x;
      hq += q[i]! * x;
      hr += r[i]! * x;
      hs += s[i]! * x;
    }
    h[c] = hp;
    h[c + 1] = hq;
    h[c + 2] = hr;
    h[c + 3] = hs;
  }
  for (; c < count; c++) h[c] = dot(basis[c]!, w);
}

/** w ← w + factor · Σ_c h_c basis_c for c < count. */
export function addCombination(
  basis: readonly Float64Array[],
  count: number,
  h: Float64Array,
  factor: number,
  w: Float64Array,
): void {
  const memory = KernelMemory.of(w);
  if (memory?.holdsAll(basis, count)) return memory.combine(basis, count, h, factor, w);
  const n = w.length;
  let c = 0;
  for (; c + 3 < count; c += 4) {
    const p = basis[c]!;
    const q = basis[c + 1]!;
    const r = basis[c + 2]!;
    const s = basis[c + 3]!;
    const hp = factor * h[c]!;
    const hq = factor * h[c + 1]!;
    const hr = factor * h[c + 2]!;
    const hs = factor * h[c + 3]!;
    for (let i = 0; i < n; i++) w[i]! += hp * p[i]! + hq * q[i]! + hr * r[i]! + hs * s[i]!;
  }
  for (; c < count; c++) axpy(factor * h[c]!, basis[c]!, w);
}

/** basis_r ← Σ_j turn[r · count + j] basis_j for r < keep, in place. */
export function rotate(
  basis: readonly Float64Array[],
  count: number,
  keep: number,
  turn: Float64Array,
  supply: Supply,
): void {
  const memory = basis[0] ? KernelMemory.of(basis[0]) : null;
  if (memory?.holdsAll(basis, count) && memory.rotate(basis, count, keep, turn)) return;
  const turned = Array.from({ length: keep }, (_, r) => {
    const x = supply.take();
    addCombination(basis, count, turn.subarray(r * count, (r + 1) * count), 1, x);
    return x;
  });
  turned.forEach((x, r) => basis[r]!.set(x));
  supply.give(...turned);
}

/** Removes the part of w in the span of an orthonormal set, in two passes (classical Gram–Schmidt, twice is enough). */
export function orthogonalise(w: Float64Array, basis: readonly Float64Array[]): void {
  const h = new Float64Array(basis.length);
  for (let pass = 0; pass < 2; pass++) {
    project(basis, basis.length, w, h);
    addCombination(basis, basis.length, h, -1, w);
  }
}

/** Fills x with a random unit vector in the complement of the given orthonormal set. */
export function randomUnit(x: Float64Array, random: Random, basis: readonly Float64Array[]): Float64Array {
  for (;;) {
    for (let i = 0; i < x.length; i++) x[i] = random.next() - 0.5;
    const before = norm(x);
    orthogonalise(x, basis);
    const size = norm(x);
    if (size > 1e-8 * before) {
      scale(x, 1 / size);
      orthogonalise(x, basis);
      scale(x, 1 / norm(x));
      return x;
    }
  }
}

/**
 * Sign convention: the entry of largest magnitude is positive, the lowest index on ties
 * (magnitudes within 1e-8 relative count as tied, so that rounding does not choose).
 */
export function fixSign(x: Float64Array): void {
  let largest = 0;
  for (const value of x) largest = Math.max(largest, Math.abs(value));
  const leading = x.find((value) => Math.abs(value) >= largest * (1 - 1e-8)) ?? 0;
  if (leading < 0) scale(x, -1);
}
