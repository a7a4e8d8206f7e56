import { KernelMemory } from '../kernels';
import { advance8, direct8, matrixBytes, WIDTH, type LaplacianOperator } from '../operators';
import { CancelledError, NotConvergedError, UnanswerableError, type Watch } from '../types';

export interface SolveResult {
  readonly x: Float64Array;
  /** ‖b − A x‖ / ‖b‖, computed anew at the end. */
  readonly residual: number;
}

export interface SolveOptions {
  /** Relative residual; 1e-10 by default. */
  readonly tolerance?: number;
  /** First guesses; zeros where there is none. */
  readonly starts?: readonly (Float64Array | undefined)[];
  /** Ceiling on iterations of one group of eight. */
  readonly ceiling?: number;
}

const RESTARTS = 8;

/**
 * Solves A x = b for A = diag(s) + α L by conjugate gradients with the diagonal as preconditioner (Hestenes & Stiefel
 * 1952), eight right-hand sides at a time, so that the network is read once for all of them; each is restarted
 * from its true residual when rounding has moved it. Call `close` at the end.
 */
export class ShiftedSystems {
  private readonly memory: KernelMemory;
  private readonly op: LaplacianOperator;
  private readonly own: Float64Array;
  private readonly inverse: Float64Array;
  private readonly x: Float64Array;
  private readonly r: Float64Array;
  private readonly p: Float64Array;
  private readonly q: Float64Array;

  /** @param l any of the Laplacians, whose diagonal is used as it stands */
  constructor(private readonly l: LaplacianOperator) {
    const { n, network } = l;
    this.memory = new KernelMemory(
      n,
      matrixBytes(network) + (4 * WIDTH + 2) * (n + 8) * 8,
      network.targets.length,
    );
    this.op = l.within(this.memory);
    this.own = this.memory.take(n);
    this.inverse = this.memory.take(n);
    this.x = this.memory.take(WIDTH * n);
    this.r = this.memory.take(WIDTH * n);
    this.p = this.memory.take(WIDTH * n);
    this.q = this.memory.take(WIDTH * n);
  }

  /**
   * @param s weights ≥ 0; every component of the network must have a positive one
   * @param right any number of right-hand sides
   * @throws UnanswerableError `bad-values` when a right-hand side or α is not finite
   * @throws NotConvergedError above the ceiling of iterations
   */
  solve(
    s: Float64Array,
    alpha: number,
    right: readonly Float64Array[],
    options: SolveOptions = {},
    watch?: Watch,
  ): SolveResult[] {
    this.own.set(s);
    for (let i = 0; i < this.l.n; i++)
      this.inverse[i] = 1 / Math.max(1e-300, s[i]! + alpha * this.l.diagonal[i]!);
    const results: SolveResult[] = [];
    for (let from = 0; from < right.length; from += WIDTH) {
      const group = right.slice(from, from + WIDTH);
      const starts = group.map((_, v) => options.starts?.[from + v]);
      results.push(...this.solveGroup(alpha, group, starts, options, watch));
    }
    return results;
  }

  private solveGroup(
    alpha: number,
    right: readonly Float64Array[],
    starts: readonly (Float64Array | undefined)[],
    options: SolveOptions,
    watch?: Watch,
  ): SolveResult[] {
    const tolerance = options.tolerance ?? 1e-10;
    let left = options.ceiling ?? 20_000;
    const sizes = new Float64Array(WIDTH);
    right.forEach((b, v) => (sizes[v] = Math.sqrt(b.reduce((sum, one) => sum + one * one, 0))));
    this.x.fill(0);
    starts.forEach((start, v) => {
      if (start && sizes[v]! > 0) this.put(start, v, this.x);
    });
    if (!sizes.every(Number.isFinite) || !(alpha >= 0 && alpha < Infinity))
      throw new UnanswerableError(
        'bad-values',
        'The equations of the smoothing hold numbers that are not finite.',
      );
    let residuals = this.trueResiduals(alpha, right, sizes);
    for (let restart = 0; restart < RESTARTS && left > 0; restart++) {
      const active = residuals.map((one) => (one > tolerance ? 1 : 0));
      if (!active.includes(1)) break;
      left = this.iterate(alpha, active, sizes, tolerance, left, watch);
      residuals = this.trueResiduals(alpha, right, sizes);
    }
    const worst = residuals.reduce((most, one) => Math.max(most, one), 0);
    // Weights over many orders of magnitude can put 1e-10 out of reach of doubles; say how far it came.
    if (!(worst <= Math.max(tolerance, 1e-8)))
      throw new NotConvergedError(
        `The smoothing did not reach its accuracy (relative residual ${worst.toExponential(1)}).`,
        worst,
      );
    return right.map((_, v) => ({
      x: Float64Array.from({ length: this.l.n }, (__, i) => this.x[WIDTH * i + v]!),
      residual: residuals[v]!,
    }));
  }

  private put(from: Float64Array, v: number, to: Float64Array): void {
    for (let i = 0; i < from.length; i++) to[WIDTH * i + v] = from[i]!;
  }

  /** r = b − A x of every system, and its relative norm. */
  private trueResiduals(alpha: number, right: readonly Float64Array[], sizes: Float64Array): Float64Array {
    this.op.shifted8(this.own, alpha, this.x, this.q, new Float64Array(WIDTH));
    const sums = new Float64Array(WIDTH);
    this.r.fill(0);
    right.forEach((b, v) => {
      if (sizes[v] === 0) return;
      for (let i = 0, at = v; i < b.length; i++, at += WIDTH) {
        const rest = b[i]! - this.q[at]!;
        this.r[at] = rest;
        sums[v]! += rest * rest;
      }
    });
    return sums.map((sum, v) => (sizes[v]! > 0 ? Math.sqrt(sum) / sizes[v]! : 0));
  }

  /** Conjugate gradients from the residuals in `r`; returns how many iterations are left. */
  private iterate(
    alpha: number,
    active: Float64Array,
    sizes: Float64Array,
    tolerance: number,
    ceiling: number,
    watch?: Watch,
  ): number {
    const sums = new Float64Array(2 * WIDTH);
    const dots = new Float64Array(WIDTH);
    const step = new Float64Array(WIDTH);
    const factor = new Float64Array(WIDTH);
    this.p.fill(0);
    direct8(factor, this.inverse, this.r, this.p);
    advance8(step, this.inverse, this.p, this.q, this.x, this.r, sums);
    const rho = sums.slice(WIDTH);
    let left = ceiling;
    for (; left > 0 && active.includes(1); left--) {
      if (left % 32 === 0 && watch?.cancelled?.()) throw new CancelledError();
      this.op.shifted8(this.own, alpha, this.p, this.q, dots);
      for (let v = 0; v < WIDTH; v++) step[v] = active[v] === 1 && dots[v]! > 0 ? rho[v]! / dots[v]! : 0;
      advance8(step, this.inverse, this.p, this.q, this.x, this.r, sums);
      for (let v = 0; v < WIDTH; v++) {
        // A direction without length ends a system as well: nothing more can be gained before a restart.
        if (Math.sqrt(sums[v]!) <= 0.5 * tolerance * sizes[v]! || step[v] === 0) active[v] = 0;
        factor[v] = active[v] === 1 ? sums[WIDTH + v]! / rho[v]! : 0;
        rho[v] = sums[WIDTH + v]!;
      }
      direct8(factor, this.inverse, this.r, this.p);
    }
    return left;
  }

  /** Ends the second thread; the systems cannot be used any more. */
  close(): void {
    this.memory.close();
  }
}
