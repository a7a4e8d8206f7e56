import type { Operator } from '../operators';
import { CancelledError, NotConvergedError, UnanswerableError, type Watch } from '../types';

export interface SolveResult {
  readonly x: Float64Array;
  /** ‖b − A x‖ / ‖b‖, computed anew at the end. */
  readonly residual: number;
}

const dot = (a: Float64Array, b: Float64Array): number => {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
};

/**
 * Solves A x = b for A = diag(s) + α L by conjugate gradients with the diagonal as preconditioner
 * (Hestenes & Stiefel 1952), restarted from the true residual when rounding has moved it.
 *
 * @param s weights ≥ 0; every component of the network must have a positive one
 * @param diagonal diagonal of L
 * @param b right-hand side, finite
 * @throws UnanswerableError `bad-values` when b or α is not finite
 * @throws NotConvergedError above `ceiling` iterations
 */
export function solveShifted(
  l: Operator,
  s: Float64Array,
  alpha: number,
  diagonal: Float64Array,
  b: Float64Array,
  options: { tolerance?: number; start?: Float64Array; ceiling?: number } = {},
  watch?: Watch,
): SolveResult {
  const n = l.n;
  const tolerance = options.tolerance ?? 1e-10;
  const ceiling = options.ceiling ?? 20_000;
  const x = options.start ? Float64Array.from(options.start) : new Float64Array(n);
  const size = Math.sqrt(dot(b, b));
  if (size === 0) return { x: new Float64Array(n), residual: 0 };
  if (!Number.isFinite(size) || !(alpha >= 0 && alpha < Infinity))
    throw new UnanswerableError(
      'bad-values',
      'The equations of the smoothing hold numbers that are not finite.',
    );
  const r = new Float64Array(n);
  const p = new Float64Array(n);
  const q = new Float64Array(n);
  const z = new Float64Array(n);
  const multiply = (from: Float64Array, to: Float64Array): void => {
    l.multiply(from, to);
    for (let i = 0; i < n; i++) to[i] = s[i]! * from[i]! + alpha * to[i]!;
  };
  const precondition = (): void => {
    for (let i = 0; i < n; i++) z[i] = r[i]! / Math.max(1e-300, s[i]! + alpha * diagonal[i]!);
  };
  let iterations = 0;
  for (let restart = 0; restart < 8; restart++) {
    multiply(x, q);
    for (let i = 0; i < n; i++) r[i] = b[i]! - q[i]!;
    const residual = Math.sqrt(dot(r, r)) / size;
    if (residual <= tolerance) return { x, residual };
    precondition();
    p.set(z);
    let rho = dot(r, z);
    for (; iterations < ceiling; iterations++) {
      if (iterations % 32 === 0 && watch?.cancelled?.()) throw new CancelledError();
      multiply(p, q);
      const step = rho / dot(p, q);
      for (let i = 0; i < n; i++) {
        x[i]! += step * p[i]!;
        r[i]! -= step * q[i]!;
      }
      if (Math.sqrt(dot(r, r)) <= 0.5 * tolerance * size) break;
      precondition();
      const next = dot(r, z);
      const beta = next / rho;
      rho = next;
      for (let i = 0; i < n; i++) p[i] = z[i]! + beta * p[i]!;
    }
  }
  multiply(x, q);
  for (let i = 0; i < n; i++) r[i] = b[i]! - q[i]!;
  const residual = Math.sqrt(dot(r, r)) / size;
  // Weights over many orders of magnitude can put 1e-10 out of reach of doubles; say how far it came.
  if (residual <= Math.max(tolerance, 1e-8)) return { x, residual };
  throw new NotConvergedError(
    `The smoothing did not reach its accuracy (relative residual ${residual.toExponential(1)}).`,
    residual,
  );
}
