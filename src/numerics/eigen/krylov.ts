import type { Random } from '../random';
import { symmetricEigen } from './dense';
import type { Supply } from './supply';
import { addCombination, axpy, dot, norm, project, randomUnit, rotate, scale } from './vectors';

/**
 * A thick-restart Lanczos basis (Wu & Simon 2000) with full reorthogonalisation, for any symmetric operator.
 * After a restart the projected matrix is an arrowhead followed by a tridiagonal part; it is kept dense, as it is small.
 */
export class Krylov {
  /** Orthonormal basis; the vector at `size` is the next direction. */
  readonly basis: Float64Array[] = [];
  /** Projected matrix, `capacity` × `capacity`. */
  private readonly projected: Float64Array;
  size = 0;
  /** Norm of the last remainder: B V = V T + β v_{size} eᵀ. */
  beta = 0;
  /** Ritz vectors carried over by the last restart; the step right after couples to all of them. */
  private kept = 0;
  private readonly h: Float64Array;

  constructor(
    private readonly n: number,
    private readonly capacity: number,
    private readonly outside: readonly Float64Array[],
    private readonly random: Random,
    private readonly supply: Supply,
  ) {
    this.projected = new Float64Array(capacity * capacity);
    this.h = new Float64Array(Math.max(capacity, outside.length) + 1);
  }

  /** Empties the basis and begins again with the unit vector that is put in, which must be orthogonal to the outside set. */
  begin(fill: (start: Float64Array) => void): void {
    this.size = 0;
    this.beta = 0;
    this.kept = 0;
    this.projected.fill(0);
    fill(this.slot(0));
  }

  get full(): boolean {
    return this.size === this.capacity || this.size + this.outside.length >= this.n;
  }

  /** One step: applies the operator to the next direction and orthogonalises. Returns false when the space is exhausted. */
  step(apply: (x: Float64Array, out: Float64Array) => void): void {
    const j = this.size;
    const w = this.slot(j + 1);
    apply(this.basis[j]!, w);
    const before = norm(w);
    // The three-term recurrence first: what it leaves is nearly orthogonal, so that one full pass mostly suffices.
    if (j > this.kept) {
      axpy(-this.beta, this.basis[j - 1]!, w);
      this.add(j - 1, j, this.beta);
    }
    const alpha = dot(this.basis[j]!, w);
    axpy(-alpha, this.basis[j]!, w);
    this.add(j, j, alpha);
    let after = norm(w);
    for (let pass = 0; pass < 3; pass++) {
      if (this.outside.length > 0) {
        project(this.outside, this.outside.length, w, this.h);
        addCombination(this.outside, this.outside.length, this.h, -1, w);
      }
      project(this.basis, j + 1, w, this.h);
      addCombination(this.basis, j + 1, this.h, -1, w);
      for (let i = 0; i <= j; i++) this.add(i, j, this.h[i]!);
      const size = norm(w);
      const enough = size > 0.7 * after;
      after = size;
      if (enough) break;
    }
    this.size = j + 1;
    if (after > 1e-13 * Math.max(before, 1e-300) && after > 0) {
      this.beta = after;
      scale(w, 1 / after);
      return;
    }
    // An invariant subspace: go on in a fresh direction, decoupled from it.
    this.beta = 0;
    if (this.size + this.outside.length < this.n) {
      randomUnit(w, this.random, [...this.outside, ...this.basis.slice(0, this.size)]);
    }
  }

  /** Ritz values in descending order, their coefficients by rows, and residual norms |β s_last|. */
  ritz(): { values: Float64Array; rows: Float64Array; residuals: Float64Array } {
    const m = this.size;
    const t = new Float64Array(m * m);
    for (let i = 0; i < m; i++) {
      for (let j = i; j < m; j++) t[i * m + j] = t[j * m + i] = this.projected[i * this.capacity + j]!;
    }
    const eigen = symmetricEigen(t, m);
    const values = new Float64Array(m);
    const rows = new Float64Array(m * m);
    const residuals = new Float64Array(m);
    for (let r = 0; r < m; r++) {
      const from = (m - 1 - r) * m;
      values[r] = eigen.values[m - 1 - r]!;
      rows.set(eigen.vectors.subarray(from, from + m), r * m);
      residuals[r] = Math.abs(this.beta * rows[r * m + m - 1]!);
    }
    return { values, rows, residuals };
  }

  /** Σ_j row[j] v_j as a vector of the supply. */
  combination(row: Float64Array): Float64Array {
    const x = this.supply.take();
    addCombination(this.basis, row.length, row, 1, x);
    return x;
  }

  /** Keeps the first `keep` Ritz vectors and the next direction; drops the rest. */
  restart(keep: number, ritz: { values: Float64Array; rows: Float64Array }): void {
    const m = this.size;
    rotate(this.basis, m, keep, ritz.rows, this.supply);
    const next = this.basis[m]!;
    this.supply.give(...this.basis.slice(keep, m));
    this.basis[keep] = next;
    this.supply.give(...this.basis.slice(m + 1));
    this.basis.length = keep + 1;
    this.projected.fill(0);
    for (let r = 0; r < keep; r++) this.projected[r * this.capacity + r] = ritz.values[r]!;
    this.size = keep;
    this.kept = keep;
  }

  private add(i: number, j: number, value: number): void {
    // After a restart the couplings to the kept vectors arise here too: row i, column j of the upper triangle.
    this.projected[i * this.capacity + j]! += value;
  }

  private slot(at: number): Float64Array {
    return (this.basis[at] ??= this.supply.take());
  }

  /** Gives every vector back. */
  release(): void {
    this.supply.give(...this.basis);
    this.basis.length = 0;
  }
}
