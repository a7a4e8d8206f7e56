import { componentMembers, components, subnetwork } from '../network';
import { KernelMemory } from '../kernels';
import { laplacianOperator, matrixBytes, type LaplacianOperator } from '../operators';
import { UnanswerableError, type LaplacianKind, type Network, type Watch } from '../types';
import { symmetricEigen } from './dense';
import { searchBytes, smallestEigenpairs, type SmallestPairs } from './smallest';
import { addCombination, axpy, fixSign, norm, scale } from './vectors';

export interface SpectrumOptions {
  readonly laplacian: LaplacianKind;
  /** How many of the smallest eigenvalues, or all of them (dense; up to `maximumDense` members). */
  readonly count: number | 'all';
  /** Regularisation of `regularised`; mean strength by default. */
  readonly tau?: number;
  /** Residual bound relative to ‖L‖; 1e-8 by default. */
  readonly tolerance?: number;
  readonly seed?: number;
}

export interface Spectrum {
  readonly laplacian: LaplacianKind;
  /** τ that was used; 0 unless regularised. */
  readonly tau: number;
  /** Graph frequencies, ascending. */
  readonly values: Float64Array;
  /** Orthonormal eigenvectors of length n, signs by the convention of `fixSign`. */
  readonly vectors: readonly Float64Array[];
  /** ‖L u − λ u‖₂ of each. */
  readonly residuals: Float64Array;
  /** 1 where the value agrees with a neighbour to 1e-8 relative: only the eigenspace is defined there. */
  readonly repeated: Uint8Array;
  /** Whether all n were computed. */
  readonly complete: boolean;
  /** The norm residuals are measured against (largest eigenvalue met). */
  readonly norm: number;
}

/** Largest network (or component) that is decomposed in full. */
export const maximumDense = 4000;
const alwaysDense = 300;

interface Part {
  values: ArrayLike<number>;
  vectors: Float64Array[];
  residuals: ArrayLike<number>;
  norm: number;
}

/**
 * The smallest eigenpairs of a Laplacian of the whole network. Components are solved one by one and merged, so
 * that a network of c components has exactly c zeros; the regularised Laplacian joins them and is solved as one.
 *
 * @throws UnanswerableError `no-members`; `too-large` when a full decomposition is asked of too large a network
 * @throws NotConvergedError when the residual bound was not reached
 */
export function spectrum(net: Network, options: SpectrumOptions, watch?: Watch): Spectrum {
  const { n } = net;
  if (n === 0) throw new UnanswerableError('no-members', 'A network without members has no spectrum.');
  const count = options.count === 'all' ? n : Math.min(n, Math.max(1, Math.floor(options.count)));
  const op = laplacianOperator(net, options.laplacian, options.tau);
  const whole = Int32Array.from({ length: n }, (_, i) => i);
  const groups = options.laplacian === 'regularised' ? [whole] : componentMembers(components(net));
  const each = Math.min(count, Math.max(1, count - groups.length + 1));
  const parts: Part[] = [];
  const owners: Int32Array[] = [];
  for (const members of groups) {
    const single = members.length === n;
    const local = single ? op : laplacianOperator(subnetwork(net, members), options.laplacian, options.tau);
    parts.push(solvePart(local, Math.min(each, members.length), options, watch));
    owners.push(members);
  }
  return merge(op, parts, owners, count);
}

/** Smallest pairs of a connected operator, its known null vector first. */
function solvePart(op: LaplacianOperator, count: number, options: SpectrumOptions, watch?: Watch): Part {
  const { n } = op;
  const zero = nullVector(op);
  if (count === 1) return { values: [0], vectors: [zero], residuals: [residual(op, zero, 0)], norm: op.norm };
  if (n <= alwaysDense || (count > n / 3 && n <= maximumDense)) return densePart(op, zero, count, watch);
  if (count > n / 3) {
    throw new UnanswerableError(
      'too-large',
      `A full decomposition is offered up to ${maximumDense} members; this part has ${n}.`,
    );
  }
  const tolerance = options.tolerance ?? 1e-8;
  const search = { count: count - 1, tolerance, deflate: [zero], seed: options.seed ?? 1 };
  const bytes = matrixBytes(op.network) + searchBytes(n, count - 1);
  const memory = new KernelMemory(n, bytes, op.network.targets.length);
  let found: SmallestPairs;
  try {
    found = smallestEigenpairs(op.within(memory), search, watch);
  } finally {
    memory.close();
  }
  return {
    values: [0, ...found.values.map((value) => Math.max(0, value))],
    vectors: [zero, ...found.vectors],
    residuals: [residual(op, zero, 0), ...found.residuals],
    norm: found.norm,
  };
}

function densePart(op: LaplacianOperator, zero: Float64Array, count: number, watch?: Watch): Part {
  const { n } = op;
  const a = op.dense();
  // The known null vector is moved to the top of the spectrum, so that it cannot mix with a tiny λ₂.
  const lift = 2 * op.norm + 1;
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) a[i * n + j]! += lift * (zero[i]! * zero[j]!);
  const eigen = symmetricEigen(a, n, watch);
  const vectors = [zero];
  const values = [0];
  for (let l = 0; l < count - 1; l++) {
    vectors.push(eigen.vectors.slice(l * n, (l + 1) * n));
    values.push(Math.max(0, eigen.values[l]!));
  }
  const residuals = vectors.map((x, l) => residual(op, x, values[l]!));
  return { values, vectors, residuals, norm: n > 1 ? eigen.values[n - 2]! : 0 };
}

/** D^{1/2} 1 (1 for the combinatorial kind), unit length: the null vector of a connected network. */
export function nullVector(op: LaplacianOperator): Float64Array {
  const x = Float64Array.from(op.scale, (s) => (s > 0 ? 1 / s : 1));
  scale(x, 1 / norm(x));
  return x;
}

function residual(op: LaplacianOperator, x: Float64Array, value: number): number {
  const r = new Float64Array(op.n);
  op.multiply(x, r);
  axpy(-value, x, r);
  return norm(r);
}

function merge(op: LaplacianOperator, parts: Part[], owners: Int32Array[], count: number): Spectrum {
  const order: { part: number; at: number; value: number }[] = [];
  parts.forEach((part, p) => {
    for (let at = 0; at < part.values.length; at++) order.push({ part: p, at, value: part.values[at]! });
  });
  order.sort((x, y) => x.value - y.value || x.part - y.part || x.at - y.at);
  order.length = count;
  const values = Float64Array.from(order, (entry) => entry.value);
  const size = parts.reduce((largest, part) => Math.max(largest, part.norm), 0);
  const repeated = new Uint8Array(count);
  for (let l = 1; l < count; l++) {
    const near = values[l]! - values[l - 1]! <= Math.max(1e-8 * values[l]!, 1e-13 * size);
    if (near) repeated[l] = repeated[l - 1] = 1;
  }
  const vectors = order.map(({ part, at }) => {
    const local = parts[part]!.vectors[at]!;
    const full = owners.length === 1 ? local : spread(local, owners[part]!, op.n);
    fixSign(full);
    return full;
  });
  return {
    laplacian: op.kind,
    tau: op.tau,
    values,
    vectors,
    residuals: Float64Array.from(order, ({ part, at }) => parts[part]!.residuals[at]!),
    repeated,
    complete: count === op.n,
    norm: size,
  };
}

function spread(local: Float64Array, members: Int32Array, n: number): Float64Array {
  const full = new Float64Array(n);
  for (let a = 0; a < members.length; a++) full[members[a]!] = local[a]!;
  return full;
}

/** Σ_l c_l u_l for the leading coefficients, a synthesis helper of the graph Fourier transform. */
export function combineVectors(
  vectors: readonly Float64Array[],
  coefficients: Float64Array,
  n: number,
): Float64Array {
  const x = new Float64Array(n);
  addCombination(vectors, coefficients.length, coefficients, 1, x);
  return x;
}
