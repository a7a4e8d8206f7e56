import { blockRows, blockRows8 } from './block';
import { WIDTH } from './eight';
import { KernelMemory, type KeptMatrix } from '../kernels';
import { UnanswerableError, type LaplacianKind, type Network } from '../types';

/** A symmetric operator on R^n. */
export interface Operator {
  readonly n: number;
  /** A bound on the operator norm, ‖A‖ ≤ norm. */
  readonly norm: number;
  /** out = A x; `x` and `out` must be different arrays of length n. */
  multiply(x: Float64Array, out: Float64Array): void;
}

export interface LaplacianOperator extends Operator {
  readonly kind: LaplacianKind;
  readonly network: Network;
  /** Mean number of stored entries in a row, for choosing between methods. */
  readonly entriesPerRow: number;
  /** Regularisation τ; 0 unless the kind is `regularised`. */
  readonly tau: number;
  /** d^{-1/2} ((d + τ)^{-1/2} when regularised; 0 on isolated members): maps u to D^{-1/2} u. All 1 for the combinatorial kind. */
  readonly scale: Float64Array;
  /** A vector of zeros in the memory where products run fastest. */
  vector(): Float64Array;
  /** The same operator with its arrays copied to where compiled kernels work; vectors that lie elsewhere take the plain path. */
  within(memory: KernelMemory): LaplacianOperator;
  /** out = α A x + β x + γ z in one pass; `out` may be the same array as `z`, not as `x`. */
  combine(
    x: Float64Array,
    z: Float64Array,
    alpha: number,
    beta: number,
    gamma: number,
    out: Float64Array,
  ): void;
  /** The matrix's own diagonal, the rank-one part included. */
  readonly diagonal: Float64Array;
  /** out = (diag(own) + α A) x for eight vectors side by side (x[8 i + v]), and dots_v = xᵀ out of each. */
  shifted8(own: Float64Array, alpha: number, x: Float64Array, out: Float64Array, dots: Float64Array): void;
  /** Row sums of A x for `width` vectors stored interleaved (x[i · width + v]); same layout out. */
  multiplyBlock(x: Float64Array, width: number, out: Float64Array): void;
  /** The matrix as n × n row-major, for small networks. */
  dense(): Float64Array;
}

/** Mean strength, the default τ (Amini, Chen, Bickel & Levina 2013); 0 without members. */
export function meanStrength(net: Network): number {
  let sum = 0;
  for (let i = 0; i < net.n; i++) sum += net.strength[i]!;
  return net.n === 0 ? 0 : sum / net.n;
}

/**
 * The chosen Laplacian of W as an operator (numerics.md):
 * combinatorial `D − W`; normalised `I − D^{-1/2} W D^{-1/2}` with a zero row on isolated members (Chung 1997);
 * regularised: the normalised Laplacian of `W + (τ/n) 11ᵀ` with strengths `d + τ`, applied as sparse plus
 * rank one (Amini, Chen, Bickel & Levina 2013; Zhang & Rohe 2018).
 *
 * @param tau only for `regularised`; mean strength by default; must be positive there
 */
export function laplacianOperator(net: Network, kind: LaplacianKind, tau?: number): LaplacianOperator {
  const t = kind === 'regularised' ? (tau ?? meanStrength(net)) : 0;
  if (kind === 'regularised' && !(t > 0 && Number.isFinite(t))) {
    throw new UnanswerableError(
      'bad-tau',
      'The regularised Laplacian needs τ > 0; a network without ties has no mean strength to take it from.',
    );
  }
  return operatorOf(net, kind, t, coefficients(net, kind, t), null);
}

function operatorOf(
  net: Network,
  kind: LaplacianKind,
  t: number,
  parts: Coefficients,
  memory: KernelMemory | null,
): LaplacianOperator {
  const { n, offsets, targets } = net;
  const { diagonal, scale, values, norm } = parts;
  const kept = memory && keep(memory, net, parts);
  const rankOne = kind === 'regularised' && n > 0 ? t / n : 0;

  const combine: LaplacianOperator['combine'] = (x, z, alpha, beta, gamma, out) => {
    let shift = 0;
    if (kept && memory.holds(x, z, out)) {
      if (rankOne !== 0) shift = alpha * rankOne * memory.dot(kept.scale, x);
      memory.product(kept, x, z, { alpha, beta, gamma, shift }, out);
      return;
    }
    if (rankOne !== 0) {
      for (let i = 0; i < n; i++) shift += scale[i]! * x[i]!;
      shift *= alpha * rankOne;
    }
    combineRows(offsets, targets, values, diagonal, scale, x, z, alpha, beta, gamma, shift, out);
  };

  const multiplyBlock: LaplacianOperator['multiplyBlock'] = (x, width, out) => {
    const shift = new Float64Array(width);
    if (rankOne !== 0) {
      for (let i = 0, q = 0; i < n; i++) for (let v = 0; v < width; v++, q++) shift[v]! += scale[i]! * x[q]!;
      for (let v = 0; v < width; v++) shift[v]! *= rankOne;
    }
    if (width === 8) blockRows8(offsets, targets, values, diagonal, x, out);
    else blockRows(offsets, targets, values, diagonal, x, width, out);
    if (rankOne === 0) return;
    for (let i = 0, q = 0; i < n; i++) for (let v = 0; v < width; v++, q++) out[q]! -= shift[v]! * scale[i]!;
  };

  const shifted8: LaplacianOperator['shifted8'] = (own, alpha, x, out, dots) => {
    if (kept && memory.holds(own, x, out)) {
      memory.shifted8(kept, own, alpha, alpha * rankOne, x, out, dots);
      return;
    }
    multiplyBlock(x, WIDTH, out);
    dots.fill(0);
    for (let i = 0, at = 0; i < n; i++) {
      for (let v = 0; v < WIDTH; v++, at++) {
        const value = own[i]! * x[at]! + alpha * out[at]!;
        out[at] = value;
        dots[v]! += x[at]! * value;
      }
    }
  };

  const dense = (): Float64Array => {
    const a = new Float64Array(n * n);
    for (let i = 0; i < n; i++) {
      if (rankOne !== 0) for (let j = 0; j < n; j++) a[i * n + j] = -rankOne * scale[i]! * scale[j]!;
      a[i * n + i]! += diagonal[i]!;
      for (let p = offsets[i]!; p < offsets[i + 1]!; p++) a[i * n + targets[p]!]! -= values[p]!;
    }
    return a;
  };

  return {
    kind,
    network: net,
    n,
    entriesPerRow: n === 0 ? 0 : targets.length / n,
    tau: t,
    norm,
    scale,
    vector: () => memory?.take(n) ?? new Float64Array(n),
    within: (other) => operatorOf(net, kind, t, parts, other),
    combine,
    multiply: (x, out) => combine(x, x, 1, 0, 0, out),
    multiplyBlock,
    shifted8,
    diagonal: rankOne === 0 ? diagonal : diagonal.map((one, i) => one - rankOne * scale[i]! ** 2),
    dense,
  };
}

/** Copies of the operator's arrays where the kernels work, or null where they do not fit. */
function keep(
  memory: KernelMemory,
  net: Network,
  { diagonal, scale, values }: Coefficients,
): KeptMatrix | null {
  const copy = (source: Float64Array): Float64Array => {
    const own = memory.take(source.length);
    own.set(source);
    return own;
  };
  const offsets = memory.keepInts(net.offsets);
  const targets = memory.keepInts(net.targets);
  if (!offsets || !targets) return null;
  const doubles = [copy(values), copy(diagonal), copy(scale)] as const;
  if (!memory.holds(...doubles)) return null;
  memory.balance(net.offsets);
  return { offsets, targets, values: doubles[0], diagonal: doubles[1], scale: doubles[2] };
}

/** Bytes that the operator's own arrays take in a kernel memory. */
export const matrixBytes = (net: Network): number =>
  net.targets.length * 12 + (net.n + 1) * 4 + net.n * 16 + 5 * 64;

/** The product itself, apart from any closure so that the engine keeps every array in a register. */
function combineRows(
  offsets: Int32Array,
  targets: Int32Array,
  values: Float64Array,
  diagonal: Float64Array,
  scale: Float64Array,
  x: Float64Array,
  z: Float64Array,
  alpha: number,
  beta: number,
  gamma: number,
  shift: number,
  out: Float64Array,
): void {
  const n = out.length;
  let p = 0;
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (const end = offsets[i + 1]!; p < end; p++) sum += values[p]! * x[targets[p]!]!;
    out[i] = (alpha * diagonal[i]! + beta) * x[i]! - alpha * sum + gamma * z[i]! - shift * scale[i]!;
  }
}

/** Diagonal, D^{-1/2}, off-diagonal values (positive; they are subtracted) and a norm bound. */
interface Coefficients {
  readonly diagonal: Float64Array;
  readonly scale: Float64Array;
  readonly values: Float64Array;
  readonly norm: number;
}

function coefficients(net: Network, kind: LaplacianKind, tau: number): Coefficients {
  const { n, offsets, targets, weights, strength } = net;
  const diagonal = new Float64Array(n);
  const scale = new Float64Array(n).fill(1);
  if (kind === 'combinatorial') {
    // λ_max ≤ max over ties of d_i + d_j (Anderson & Morley 1985, weighted form).
    let norm = 0;
    for (let i = 0; i < n; i++) {
      diagonal[i] = strength[i]!;
      for (let p = offsets[i]!; p < offsets[i + 1]!; p++)
        norm = Math.max(norm, strength[i]! + strength[targets[p]!]!);
    }
    return { diagonal, scale, values: weights, norm };
  }
  for (let i = 0; i < n; i++) {
    const d = strength[i]! + tau;
    scale[i] = d > 0 ? 1 / Math.sqrt(d) : 0;
    diagonal[i] = d > 0 ? 1 : 0;
  }
  const values = new Float64Array(weights.length);
  for (let i = 0; i < n; i++) {
    for (let p = offsets[i]!; p < offsets[i + 1]!; p++)
      values[p] = weights[p]! * (scale[i]! * scale[targets[p]!]!);
  }
  return { diagonal, scale, values, norm: weights.length > 0 || tau > 0 ? 2 : 0 };
}
