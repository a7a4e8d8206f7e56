import { components } from '../network';
import { createRandom } from '../random';
import { cholesky, choleskySolve, ShiftedSystems } from '../solvers';
import { CancelledError, NotConvergedError, UnanswerableError, type Watch } from '../types';
import { toSpectral, type ExactBasis } from './exact-basis';
import type { Problem } from './model';

/** Folds of the hold-out; fewer where fewer members are observed. */
export const FOLDS = 10;
/** A stream of its own, so that folds do not repeat draws that made the data. */
const FOLD_STREAM = 0x3c6ef372;

/**
 * Seeded folds of the observed members, as equal in size as can be.
 * @param observed length n, 1 where observed
 * @returns length n: 0…folds − 1, −1 where not observed
 */
export function foldsOf(observed: Uint8Array, folds: number, seed: number): Int32Array {
  const members = Int32Array.from(observed.keys()).filter((i) => observed[i] === 1);
  const out = new Int32Array(observed.length).fill(-1);
  createRandom(seed ^ FOLD_STREAM)
    .shuffle(members)
    .forEach((i, at) => (out[i] = at % folds));
  return out;
}

/**
 * Hold-out criterion of the Tikhonov filter without levels (Stone 1974; ten folds after Breiman & Spector 1992): each
 * fold is predicted by (S₋ + αL) ŷ = S₋ y with its weights set to 0, and the criterion is the mean of s_i (y_i − ŷ_i)²
 * over the members that can be predicted: those in a component with an observed member outside their fold. With ten
 * observed members or fewer it leaves out one at a time. Where groups have levels of their own it smooths less than
 * generalised cross-validation, as leaving out one does (planted communities of 200, ten seeds: 1.2 times its error).
 *
 * With an eigenbasis exactly, as the left-out residuals of a fold are (I − H_FF)⁻¹ (y − ŷ)_F; else by conjugate gradients.
 */
export class HoldOut {
  private readonly fold: Int32Array;
  private readonly folds: number;
  private readonly predictable: Uint8Array;
  private readonly count: number;
  private readonly starts: Float64Array[] = [];
  private readonly exact: ExactFolds | null;

  /**
   * @param by what predicts: the eigenbasis of the problem, or a solver of its equations
   * @throws UnanswerableError `too-few-observed` when no member can be predicted from others
   */
  constructor(
    private readonly problem: Problem,
    seed: number,
    private readonly by: ExactBasis | ShiftedSystems,
    private readonly watch?: Watch,
  ) {
    const { observed } = problem;
    this.folds = Math.min(
      FOLDS,
      observed.reduce((sum, one) => sum + one, 0),
    );
    this.fold = foldsOf(observed, this.folds, seed);
    this.predictable = predictableOf(problem, this.fold);
    this.count = this.predictable.reduce((sum, one) => sum + one, 0);
    if (this.count === 0)
      throw new UnanswerableError(
        'too-few-observed',
        'No member with a value is connected to another one with a value, so no strength can be tried on left-out scores.',
      );
    const members = Array.from({ length: this.folds }, (_, f) =>
      Int32Array.from(this.fold.keys()).filter((i) => this.fold[i] === f && this.predictable[i] === 1),
    );
    this.exact = by instanceof ShiftedSystems ? null : new ExactFolds(problem, by, members);
  }

  /** The criterion at strength α > 0, Infinity where it cannot be told; by conjugate gradients from solves to 1e-8, fastest for α close to the last one. */
  error(alpha: number): number {
    if (this.watch?.cancelled?.()) throw new CancelledError();
    if (this.exact) return this.exact.total(alpha) / this.count;
    const systems = this.by as ShiftedSystems;
    const { s, y } = this.problem;
    let total = 0;
    for (let fold = 0; fold < this.folds; fold++) {
      const weights = s.map((one, i) => (this.fold[i] === fold ? 0 : one));
      // One fold at a time, as each has weights of its own.
      const [solved] = systems.solve(
        weights,
        alpha,
        [weights.map((one, i) => one * y[i]!)],
        { tolerance: 1e-8, starts: [this.starts[fold]] },
        this.watch,
      );
      const { x } = solved!;
      this.starts[fold] = x;
      for (let i = 0; i < x.length; i++)
        if (this.fold[i] === fold && this.predictable[i] === 1) total += s[i]! * (y[i]! - x[i]!) ** 2;
    }
    return total / this.count;
  }
}

/** Left-out residuals of whole folds in the eigenbasis, in variables scaled by √s. */
class ExactFolds {
  private readonly values: Float64Array;
  private readonly yHat: Float64Array;
  private readonly folds: readonly { readonly rows: Float64Array; readonly y: Float64Array }[];

  constructor(problem: Problem, basis: ExactBasis, members: readonly Int32Array[]) {
    const { observed, root, vectors, values } = basis;
    const no = observed.length;
    const y = Float64Array.from(observed, (i, a) => root[a]! * problem.y[i]!);
    const place = new Int32Array(problem.l.n);
    observed.forEach((i, a) => (place[i] = a));
    this.values = values;
    this.yHat = toSpectral(basis, y);
    this.folds = members.map((fold) => {
      const rows = new Float64Array(fold.length * no);
      fold.forEach((i, f) => {
        for (let k = 0; k < no; k++) rows[f * no + k] = vectors[k * no + place[i]!]!;
      });
      return { rows, y: Float64Array.from(fold, (i) => y[place[i]!]!) };
    });
  }

  total(alpha: number): number {
    const { values, yHat } = this;
    const no = values.length;
    const d = values.map((value) => 1 / (1 + alpha * value));
    let total = 0;
    for (const { rows, y } of this.folds) {
      const size = y.length;
      const free = new Float64Array(size * size);
      const rest = new Float64Array(size);
      const scaled = new Float64Array(no);
      for (let f = 0; f < size; f++) {
        let fitted = 0;
        for (let k = 0; k < no; k++) {
          scaled[k] = d[k]! * rows[f * no + k]!;
          fitted += scaled[k]! * yHat[k]!;
        }
        rest[f] = y[f]! - fitted;
        for (let g = 0; g <= f; g++) {
          let sum = 0;
          for (let k = 0; k < no; k++) sum += scaled[k]! * rows[g * no + k]!;
          free[f * size + g] = (f === g ? 1 : 0) - sum;
        }
      }
      // Ties so weak that rounding leaves nothing of them: this strength cannot be tried.
      if (!isFactored(free, size)) return Infinity;
      choleskySolve(free, size, rest);
      for (const one of rest) total += one * one;
    }
    return total;
  }
}

function isFactored(a: Float64Array, size: number): boolean {
  try {
    cholesky(a, size);
    return true;
  } catch (error) {
    if (error instanceof NotConvergedError) return false;
    throw error;
  }
}

/** 1 for members whose component holds an observed member of another fold. */
function predictableOf({ l, observed }: Problem, fold: Int32Array): Uint8Array {
  // The regularised Laplacian ties everybody to everybody.
  const labels = l.kind === 'regularised' ? new Int32Array(l.n) : components(l.network).labels;
  const first = new Map<number, number>();
  const several = new Set<number>();
  observed.forEach((one, i) => {
    if (one === 0) return;
    const label = labels[i]!;
    const seen = first.get(label);
    if (seen === undefined) first.set(label, fold[i]!);
    else if (seen !== fold[i]) several.add(label);
  });
  return observed.map((one, i) => (one === 1 && several.has(labels[i]!) ? 1 : 0));
}
