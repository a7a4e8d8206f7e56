import { symmetricEigen } from '../eigen';
import { cholesky, choleskySolve } from '../solvers';
import type { Watch } from '../types';
import type { Problem } from './model';

/**
 * The problem seen from its observed members: L̃ = L_oo − L_ou L_uu⁻¹ L_uo (missing members follow their ties),
 * M = S^{-1/2} L̃ S^{-1/2} = Uᵀ Λ U. Every strength of smoothing then costs only sums over Λ.
 */
export interface ExactBasis {
  readonly observed: Int32Array;
  readonly missing: Int32Array;
  readonly root: Float64Array;
  readonly values: Float64Array;
  /** Row l is the eigenvector of values[l], n_o × n_o. */
  readonly vectors: Float64Array;
  /** L_uu⁻¹ L_uo, n_u × n_o. */
  readonly bridge: Float64Array;
  /** Diagonal of L_uu⁻¹. */
  readonly own: Float64Array;
}

export function exactBasis(problem: Problem, watch?: Watch): ExactBasis {
  const { l, observed: has, s } = problem;
  const n = l.n;
  const dense = l.dense();
  const observed = Int32Array.from(has.keys()).filter((i) => has[i] === 1);
  const missing = Int32Array.from(has.keys()).filter((i) => has[i] === 0);
  const no = observed.length;
  const nu = missing.length;
  const { bridge, own } = solveMissing(dense, n, observed, missing);
  const root = Float64Array.from(observed, (i) => Math.sqrt(s[i]!));
  const m = new Float64Array(no * no);
  for (let a = 0; a < no; a++) {
    const row = observed[a]! * n;
    for (let b = 0; b <= a; b++) m[a * no + b] = dense[row + observed[b]!]!;
  }
  for (let u = 0; u < nu; u++) {
    const row = missing[u]! * n;
    for (let a = 0; a < no; a++) {
      const tie = dense[row + observed[a]!]!;
      if (tie === 0) continue;
      for (let b = 0; b <= a; b++) m[a * no + b]! -= tie * bridge[u * no + b]!;
    }
  }
  for (let a = 0; a < no; a++)
    for (let b = 0; b <= a; b++) {
      const value = m[a * no + b]! / (root[a]! * root[b]!);
      m[a * no + b] = value;
      m[b * no + a] = value;
    }
  const { values, vectors } = symmetricEigen(m, no, watch);
  // The constants of the components are null exactly; rounding must not give them a penalty.
  for (let k = 0; k < no; k++) values[k] = k < problem.nullity ? 0 : Math.max(0, values[k]!);
  return { observed, missing, root, values, vectors, bridge, own };
}

function solveMissing(
  dense: Float64Array,
  n: number,
  observed: Int32Array,
  missing: Int32Array,
): { bridge: Float64Array; own: Float64Array } {
  const no = observed.length;
  const nu = missing.length;
  const bridge = new Float64Array(nu * no);
  const own = new Float64Array(nu);
  if (nu === 0) return { bridge, own };
  const luu = new Float64Array(nu * nu);
  for (let a = 0; a < nu; a++)
    for (let b = 0; b <= a; b++) luu[a * nu + b] = dense[missing[a]! * n + missing[b]!]!;
  cholesky(luu, nu);
  const column = new Float64Array(nu);
  for (let b = 0; b < no; b++) {
    let any = false;
    for (let a = 0; a < nu; a++) {
      column[a] = dense[missing[a]! * n + observed[b]!]!;
      any ||= column[a] !== 0;
    }
    if (!any) continue;
    choleskySolve(luu, nu, column);
    for (let a = 0; a < nu; a++) bridge[a * no + b] = column[a]!;
  }
  for (let a = 0; a < nu; a++) {
    column.fill(0);
    column[a] = 1;
    choleskySolve(luu, nu, column);
    own[a] = column[a]!;
  }
  return { bridge, own };
}

/** Coordinates of a vector over the observed members in the eigenbasis. */
export function toSpectral(basis: ExactBasis, v: Float64Array): Float64Array {
  const no = basis.observed.length;
  const out = new Float64Array(no);
  for (let k = 0; k < no; k++) {
    let sum = 0;
    for (let i = 0; i < no; i++) sum += basis.vectors[k * no + i]! * v[i]!;
    out[k] = sum;
  }
  return out;
}

/** And back. */
export function fromSpectral(basis: ExactBasis, c: Float64Array): Float64Array {
  const no = basis.observed.length;
  const out = new Float64Array(no);
  for (let k = 0; k < no; k++) for (let i = 0; i < no; i++) out[i]! += basis.vectors[k * no + i]! * c[k]!;
  return out;
}
