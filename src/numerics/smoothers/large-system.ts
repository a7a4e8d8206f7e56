import { components } from '../network';
import { WIDTH } from '../operators';
import { createRandom } from '../random';
import type { ShiftedSystems } from '../solvers';
import type { Watch } from '../types';
import { groupColumns, type Fit, type Problem } from './model';
import { pseudoInverse, quadraticForm, times, type PseudoInverse } from './small-matrix';

/**
 * Probes of the trace, in eights. Their noise in the slope of the likelihood grows as √n and the slope as n, so that
 * small networks need many: with 8 at 2,500 members one fit in five ran to no variation along ties at all.
 */
const probesFor = (n: number): number => 8 * Math.max(1, Math.min(8, Math.round(20_000 / n)));
const DIAGONAL_PROBES = 48;
/** Streams of their own: probes must not repeat draws that made the data, as a demo with the same seed would. */
const PROBE_STREAM = 0x5bd1e995;
const DIAGONAL_STREAM = 0x2c1b3c6d;

interface Solved {
  readonly f: Float64Array;
  readonly fx: Float64Array[];
  readonly beta: Float64Array;
  readonly c: PseudoInverse;
  readonly quadratic: number;
  readonly degrees: number;
  readonly smoothed: Float64Array;
  residual: number;
}

/**
 * The same smoother for large networks: conjugate gradients for the scores, Hutchinson probes (1990) for traces.
 * `A = S + αL`; members of weight 0 are simply unobserved.
 */
export class LargeSystem {
  private readonly weights: Float64Array;
  private readonly columns: Float64Array[];
  private readonly probes: Float64Array[];
  private readonly starts = new Map<string, Float64Array>();

  constructor(
    private readonly problem: Problem,
    zeroed: Uint8Array,
    private readonly seed: number,
    private readonly systems: ShiftedSystems,
    private readonly watch?: Watch,
  ) {
    this.weights = Float64Array.from(problem.s, (s, i) => (zeroed[i] === 1 ? 0 : s));
    this.columns = groupColumns(problem.groups, this.weights);
    const random = createRandom(seed ^ PROBE_STREAM);
    this.probes = Array.from({ length: probesFor(problem.l.n) }, () =>
      Float64Array.from({ length: problem.l.n }, () => (random.next() < 0.5 ? -1 : 1)),
    );
  }

  /** A⁻¹ b of several; each starts from the solution that last bore its name. */
  private solve(
    names: readonly string[],
    right: readonly Float64Array[],
    alpha: number,
    tolerance: number,
  ): { solutions: Float64Array[]; residual: number } {
    const starts = names.map((name) => this.starts.get(name));
    const results = this.systems.solve(this.weights, alpha, right, { tolerance, starts }, this.watch);
    results.forEach(({ x }, k) => this.starts.set(names[k]!, x));
    return {
      solutions: results.map(({ x }) => x),
      residual: results.reduce((most, { residual }) => Math.max(most, residual), 0),
    };
  }

  private solved(alpha: number, tolerance: number): Solved {
    const { y } = this.problem;
    const w = this.weights;
    const weigh = (v: Float64Array): Float64Array => v.map((one, i) => one * w[i]!);
    const { solutions, residual } = this.solve(
      ['y', ...this.columns.map((_, j) => `x${j}`)],
      [y, ...this.columns].map(weigh),
      alpha,
      tolerance,
    );
    const [fy, ...fx] = solutions as [Float64Array, ...Float64Array[]];
    const g = fx.length;
    // aᵀ P b with P = W − W A⁻¹ W.
    const product = (a: Float64Array, b: Float64Array, fb: Float64Array): number => {
      let sum = 0;
      for (let i = 0; i < a.length; i++) sum += w[i]! * a[i]! * (b[i]! - fb[i]!);
      return sum;
    };
    const xpx = new Float64Array(g * g);
    for (let i = 0; i < g; i++)
      for (let j = 0; j < g; j++) xpx[i * g + j] = product(this.columns[i]!, this.columns[j]!, fx[j]!);
    for (let i = 0; i < g; i++)
      for (let j = 0; j < i; j++) {
        const mean = (xpx[i * g + j]! + xpx[j * g + i]!) / 2;
        xpx[i * g + j] = mean;
        xpx[j * g + i] = mean;
      }
    const xpy = Float64Array.from(this.columns, (column) => product(column, y, fy));
    const c = pseudoInverse(xpx, g);
    const beta = times(c.matrix, xpy);
    const quadratic = Math.max(1e-300, product(y, y, fy) - beta.reduce((sum, b, j) => sum + b * xpy[j]!, 0));
    const f = fy.map((one, i) => one - fx.reduce((sum, column, j) => sum + column[i]! * beta[j]!, 0));
    const smoothed = f.map(
      (one, i) => one + this.columns.reduce((sum, column, j) => sum + column[i]! * beta[j]!, 0),
    );
    const observed = w.reduce((sum, one) => sum + (one > 0 ? 1 : 0), 0);
    return {
      f,
      fx,
      beta,
      c,
      quadratic,
      degrees: observed - this.problem.nullity - c.rank,
      smoothed,
      residual,
    };
  }

  private energy(a: Float64Array, b: Float64Array): number {
    const out = new Float64Array(a.length);
    this.problem.l.multiply(a, out);
    return out.reduce((sum, one, i) => sum + one * b[i]!, 0);
  }

  /**
   * tr A⁻¹S. Exact on the span of the levels (or of the constants), where most of it lies when smoothing is strong;
   * the rest by probes that are kept out of that span, the same for every α, so that it is a smooth function of α.
   */
  private trace(alpha: number, fx: readonly Float64Array[], tolerance: number): number {
    const w = this.weights;
    const root = w.map(Math.sqrt);
    const spans = fx.length > 0 ? this.columns : this.constants();
    let sum = 0;
    const directions = spans.map((column, j) => {
      let size = 0;
      let inside = 0;
      column.forEach((one, i) => {
        size += w[i]! * one * one;
        // A⁻¹S of a constant is that constant.
        inside += w[i]! * one * (fx[j]?.[i] ?? one);
      });
      if (size > 0) sum += inside / size;
      return column.map((one, i) => (size > 0 ? (root[i]! * one) / Math.sqrt(size) : 0));
    });
    const right = this.probes.map((probe) => {
      const z = Float64Array.from(probe);
      for (const q of directions) {
        const along = q.reduce((total, one, i) => total + one * probe[i]!, 0);
        for (let i = 0; i < z.length; i++) z[i]! -= along * q[i]!;
      }
      return z.map((one, i) => one * root[i]!);
    });
    const names = right.map((_, k) => `p${k}`);
    let rest = 0;
    this.solve(names, right, alpha, tolerance).solutions.forEach((x, k) => {
      for (let i = 0; i < x.length; i++) rest += right[k]![i]! * x[i]!;
    });
    return sum + rest / this.probes.length;
  }

  /** One constant for each of the larger components; the small ones are left to the probes. */
  private constants(): Float64Array[] {
    const { labels, sizes } = components(this.problem.l.network);
    const large = Array.from(sizes.keys()).filter(
      (c) => sizes[c]! > 20 && this.problem.l.kind === 'combinatorial',
    );
    return large.slice(0, 32).map((c) => Float64Array.from(labels, (one) => (one === c ? 1 : 0)));
  }

  /** Derivative of −2 log restricted likelihood by log α; its root is the estimate. */
  score(alpha: number): number {
    const { f, fx, c, quadratic, degrees } = this.solved(alpha, 1e-4);
    const g = fx.length;
    let levels = 0;
    for (let i = 0; i < g; i++)
      for (let j = 0; j < g; j++) levels += c.matrix[i * g + j]! * this.energy(fx[i]!, fx[j]!);
    const fit = (degrees * alpha * this.energy(f, f)) / quadratic;
    return fit + this.problem.nullity - this.trace(alpha, fx, 1e-4) + alpha * levels;
  }

  /** Generalised cross-validation for a smoother without levels. */
  crossValidation(alpha: number): number {
    const { smoothed, fx } = this.solved(alpha, 1e-6);
    const { y } = this.problem;
    let rss = 0;
    let count = 0;
    this.weights.forEach((w, i) => {
      if (w === 0) return;
      rss += w * (y[i]! - smoothed[i]!) ** 2;
      count++;
    });
    const free = count - this.trace(alpha, fx, 1e-5);
    return (count * rss) / (free * free);
  }

  /** Diagonal of A⁻¹: N, N² in closed form, the rest of the Neumann series by probes (a control variate). */
  private inverseDiagonal(alpha: number, probes: number): Float64Array {
    const { l } = this.problem;
    const n = l.n;
    const scale = l.diagonal.map((d, i) => 1 / Math.sqrt(this.weights[i]! + alpha * d));
    const squares = this.neighbourSquares(alpha, scale);
    const random = createRandom(this.seed ^ DIAGONAL_STREAM);
    const estimate = new Float64Array(n);
    const times1 = (v: Float64Array): Float64Array => {
      // N v = v − D^{-1/2} A D^{-1/2} v
      const inside = v.map((one, i) => one * scale[i]!);
      const out = new Float64Array(n);
      l.multiply(inside, out);
      return v.map((one, i) => one - scale[i]! * (this.weights[i]! * inside[i]! + alpha * out[i]!));
    };
    for (let k = 0; k < probes; k += WIDTH) {
      this.watch?.progress?.(0.7 + (0.2 * k) / probes, 'Weighing each member’s own score');
      const signs = Array.from({ length: Math.min(WIDTH, probes - k) }, () =>
        Float64Array.from({ length: n }, () => (random.next() < 0.5 ? -1 : 1)),
      );
      const right = signs.map((z) => z.map((one, i) => one / scale[i]!));
      const solved = this.systems.solve(this.weights, alpha, right, { tolerance: 1e-5 }, this.watch);
      signs.forEach((z, v) => {
        const { x } = solved[v]!;
        const n1 = times1(z);
        const n2 = times1(n1);
        for (let i = 0; i < n; i++)
          estimate[i]! += (z[i]! * (x[i]! / scale[i]! - z[i]! - n1[i]! - n2[i]!)) / probes;
      });
    }
    // All terms of the series have a non-negative diagonal, so the closed part is a lower bound.
    return estimate.map((rest, i) => scale[i]! ** 2 * (1 + squares[i]! + Math.max(0, rest)));
  }

  private neighbourSquares(alpha: number, scale: Float64Array): Float64Array {
    const { network, kind, scale: own } = this.problem.l;
    return Float64Array.from({ length: network.n }, (_, i) => {
      let sum = 0;
      for (let k = network.offsets[i]!; k < network.offsets[i + 1]!; k++) {
        const j = network.targets[k]!;
        const entry =
          kind === 'combinatorial' ? network.weights[k]! : network.weights[k]! * own[i]! * own[j]!;
        sum += (alpha * entry * scale[i]! * scale[j]!) ** 2;
      }
      return sum;
    });
  }

  /** Exact [A⁻¹]_ii of some members, by solving. */
  exactDiagonal(alpha: number, members: readonly number[]): Float64Array {
    const own = new Float64Array(members.length);
    for (let from = 0; from < members.length; from += WIDTH) {
      this.watch?.progress?.(0.9 + (0.08 * from) / members.length, 'Checking members near the line exactly');
      const group = members.slice(from, from + WIDTH);
      const right = group.map((i) => {
        const b = new Float64Array(this.problem.l.n);
        b[i] = 1;
        return b;
      });
      this.systems
        .solve(this.weights, alpha, right, { tolerance: 1e-8 }, this.watch)
        .forEach(({ x }, v) => (own[from + v] = x[group[v]!]!));
    }
    return own;
  }

  /** @param rough fewer probes and a looser solve, for the rounds that only look for wild scores */
  fit(alpha: number, rough = false): Fit & { readonly refine: (members: readonly number[]) => void } {
    const solved = this.solved(alpha, rough ? 1e-6 : 1e-10);
    const { fx, c, quadratic, degrees, smoothed, residual } = solved;
    const inverse = this.inverseDiagonal(alpha, rough ? 12 : DIAGONAL_PROBES);
    const n = smoothed.length;
    const variance = new Float64Array(n);
    const leverage = new Float64Array(n);
    const exact = new Uint8Array(n);
    const set = (i: number, own: number): void => {
      const r = this.columns.map((column, j) => column[i]! - fx[j]![i]!);
      variance[i] = own + quadraticForm(c.matrix, r);
      leverage[i] = Math.min(this.weights[i]! * variance[i], 1 - 1e-6);
    };
    inverse.forEach((own, i) => set(i, own));
    return {
      alpha,
      smoothed,
      variance,
      leverage,
      exact,
      quadratic,
      degrees,
      residual,
      refine: (members) => {
        const own = this.exactDiagonal(alpha, members);
        members.forEach((i, at) => {
          set(i, own[at]!);
          exact[i] = 1;
        });
      },
    };
  }
}
