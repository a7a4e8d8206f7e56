import type { LaplacianOperator } from '../operators';
import { createRandom, type Random } from '../random';
import { CancelledError, NotConvergedError, type Watch } from '../types';
import { chebyshevFilter, type Filter } from './filter';
import { chooseDegree, nextCut } from './filter-choice';
import { inversePairs, shiftedInverse, type Inverse } from './inverse';
import { Krylov } from './krylov';
import { rayleighRitz, type Pairs } from './rayleigh-ritz';
import { best, share } from './search-helpers';
import { Supply } from './supply';
import { addCombination, norm, orthogonalise, randomUnit, scale } from './vectors';

export interface SmallestOptions {
  /** How many eigenpairs, at most n − deflate.length. */
  readonly count: number;
  /** Residual bound relative to ‖A‖. */
  readonly tolerance: number;
  /** Orthonormal vectors known to be eigenvectors; the search runs in their complement. */
  readonly deflate: readonly Float64Array[];
  readonly seed: number;
  /** Ceiling on products with A; `NotConvergedError` beyond it. */
  readonly maxProducts?: number;
}

export interface SmallestPairs extends Pairs {
  /** Largest Ritz value met, a lower bound of ‖A‖ that residuals are measured against. */
  readonly norm: number;
  readonly products: number;
}

/**
 * Smallest eigenpairs of a positive semi-definite operator by polynomial-filtered thick-restart Lanczos:
 * a plain Lanczos cycle finds the edges of the spectrum, then a Chebyshev polynomial that damps the unwanted
 * part is used as the operator (Wu & Simon 2000; Zhou & Saad 2007; Fang & Saad 2012). The pairs are taken from a
 * Rayleigh–Ritz step on A itself, whose residuals are what is tested. Then the complement is probed from a fresh
 * start, as a Krylov space sees only one vector of a repeated eigenvalue.
 */
export function smallestEigenpairs(
  op: LaplacianOperator,
  options: SmallestOptions,
  watch?: Watch,
): SmallestPairs {
  const search = new Search(op, options, watch);
  const deflate = options.deflate.map((one) => search.copy(one));
  let pairs = search.find(options.count, deflate, null);
  for (let round = 0; ; round++) {
    const last = pairs.values[options.count - 1]!;
    if (options.count + deflate.length >= op.n || round > 2 * options.count) break;
    const missed = search.probe(last, [...deflate, ...pairs.vectors]);
    if (missed === null) break;
    pairs = best(pairs, missed, options.count);
  }
  const vectors = pairs.vectors.map((one) => new Float64Array(one));
  return { ...pairs, vectors, norm: search.norm, products: search.products };
}

const capacityFor = (count: number): number => Math.max(40, 2 * count + 24);

/** Bytes of all vectors that a search for `count` pairs of an operator on R^n has at one time. */
export function searchBytes(n: number, count: number): number {
  const capacity = capacityFor(count);
  const vectors = capacity + 4 * count + 12;
  return vectors * (Math.ceil(n / 8) * 64) + 8 * (capacity * capacity + 2 * 1_024 * capacity);
}

/**
 * Products after which a factorisation is tried, where so many more are to be expected that the gap must be small:
 * on a thin network the inverse is cheap, but on others the attempt costs dozens of products.
 */
const patience = 250;
const slow = (count: number): number => 1_000 + 150 * count;

const nothing: Pairs = { values: [], vectors: [], residuals: [] };

class Search {
  norm = 0;
  products = 0;
  private readonly random: Random;
  private readonly supply: Supply;
  private readonly spare: Float64Array;
  private readonly limit: number;
  private top = 0;
  /** Share done, which never falls: a probe after the search reports what the search had reached. */
  private done = 0;
  private filter: Filter | null = null;
  /** Undefined until the gap was seen to be small; null where a factorisation is too costly. */
  private inverse: Inverse | null | undefined;

  constructor(
    private readonly op: LaplacianOperator,
    private readonly options: SmallestOptions,
    private readonly watch: Watch | undefined,
  ) {
    this.random = createRandom(options.seed);
    this.limit = options.maxProducts ?? 40_000;
    this.supply = new Supply(() => op.vector());
    this.spare = this.supply.take();
  }

  copy(x: Float64Array): Float64Array {
    const copy = this.supply.take();
    copy.set(x);
    return copy;
  }

  /** Is there an eigenvalue below `bound` in the complement of `outside`? Returns that pair, or null. */
  probe(bound: number, outside: readonly Float64Array[]): Pairs | null {
    // With the inverse λ is known to many digits; otherwise a Ritz value may be off by its residual.
    const slack = Math.max(
      1e-8 * (bound - (this.inverse?.shift ?? 0)),
      this.inverse ? 0 : this.options.tolerance * this.norm,
    );
    const pairs = this.find(1, outside, bound - slack);
    return pairs.values.length > 0 && pairs.values[0]! < bound - slack ? pairs : null;
  }

  /**
   * The `count` smallest pairs in the complement of `outside`. With `above`, only one that lies below it is wanted:
   * empty as soon as the smallest is seen to lie above, or when nothing lower has shown itself after half the
   * products that the search took so far.
   */
  find(count: number, outside: readonly Float64Array[], above: number | null): Pairs {
    const { op } = this;
    if (this.inverse) return this.byInverse(this.inverse, count, outside, above);
    const room = op.n - outside.length;
    const capacity = Math.min(room, capacityFor(count));
    const krylov = new Krylov(op.n, capacity, outside, this.random, this.supply);
    krylov.begin((start) => randomUnit(start, this.random, outside));
    try {
      return this.search(krylov, capacity, count, outside, above);
    } finally {
      krylov.release();
    }
  }

  private search(
    krylov: Krylov,
    capacity: number,
    count: number,
    outside: readonly Float64Array[],
    above: number | null,
  ): Pairs {
    const { op } = this;
    let filter = this.filter;
    if (filter === null || above === null) {
      const early = this.plain(krylov, count, Math.min(capacity, Math.max(24, count + 16)), outside);
      if (early !== null) return early;
      filter = this.firstFilter(krylov, count, capacity, outside);
    }
    const keep = Math.min(capacity - 2, count + Math.floor(0.4 * (capacity - count)));
    // The estimates are on the low side; a step of Rayleigh–Ritz that fails costs more than a step of Lanczos.
    let margin = 0.15;
    let gathered = 0;
    const before = this.products;
    for (;;) {
      // The small eigenproblem of a check costs as much as some products, so it waits until it may tell something.
      const stride = capacity < 50 ? 3 : Math.floor(capacity / 8);
      let next = count + stride;
      let checked: { size: number; share: number } | null = null;
      while (!krylov.full) {
        krylov.step(this.counted(filter));
        gathered += Math.log(2 * Math.max(1, filter.at(above ?? 0)));
        this.look(this.done);
        if (krylov.size < count || (krylov.size < next && !krylov.full)) continue;
        const ritz = krylov.ritz();
        const estimates = this.estimates(ritz, count, filter);
        const bar = this.options.tolerance * this.norm * margin;
        const reached = share(estimates, bar, this.norm);
        const rate = checked ? (reached - checked.share) / (krylov.size - checked.size) : 0;
        // Convergence gains pace, so what is left is told from the rate for a short way only.
        const ahead = above === null && rate > 0 ? Math.floor((0.8 * (1 - reached)) / rate) : 0;
        next = krylov.size + Math.min(2 * stride, Math.max(stride, ahead));
        checked = { size: krylov.size, share: reached };
        this.done = Math.max(this.done, reached);
        if (above !== null && gathered > 0.5 * Math.log(op.n) + 6) {
          const bar = filter.at(above);
          const surely = ritz.values[0]! + ritz.residuals[0]! < bar;
          if (surely || (ritz.values[0]! < bar && this.products - before > 0.5 * before)) return nothing;
        }
        const settled = estimates.every((estimate) => estimate <= bar);
        if (!settled && !(krylov.full && krylov.size + outside.length >= op.n)) continue;
        const m = krylov.size;
        const span = Array.from({ length: count }, (_, r) =>
          krylov.combination(ritz.rows.subarray(r * m, (r + 1) * m)),
        );
        const pairs = rayleighRitz(op, span, outside, this.supply);
        this.products += count;
        if (pairs.residuals.every((residual) => residual <= this.options.tolerance * this.norm)) {
          this.filter = filter;
          return pairs;
        }
        this.supply.give(...pairs.vectors);
        const worst = Math.max(...pairs.residuals);
        margin = (0.7 * Math.max(...estimates)) / worst;
        if (!(margin > 1e-12)) throw this.failure(worst);
      }
      const expected = this.products / Math.max(this.done, 1e-3);
      if (this.inverse === undefined && this.products > patience && expected > slow(count)) {
        this.inverse = shiftedInverse(op);
        if (this.inverse) return this.byInverse(this.inverse, count, outside, above);
      }
      const ritz = krylov.ritz();
      // Wanted values within the unwanted interval are not seen at all: the interval began too low.
      const cut =
        ritz.values[count - 1]! > 1 || filter.cut >= 0.9 * this.top
          ? nextCut(filter, ritz.values, count, keep)
          : Math.min(0.9 * this.top, 1.6 * filter.cut);
      if (cut === null) {
        krylov.restart(keep, ritz);
      } else {
        const start = this.mixture(krylov, ritz, Math.min(keep, count + 2), outside);
        filter = this.makeFilter(
          filter.inverse(ritz.values[0]!),
          Math.min(cut, filter.inverse(ritz.values[count - 1]!)),
          cut,
          capacity,
        );
        this.restartFrom(krylov, start);
      }
    }
  }

  private byInverse(
    inverse: Inverse,
    count: number,
    outside: readonly Float64Array[],
    above: number | null,
  ): Pairs {
    const pairs = inversePairs(this.op, inverse, count, outside, above, this.random, this.supply, () => {
      this.products++;
      this.look((this.done = Math.max(this.done, 0.5)));
    });
    const worst = Math.max(0, ...pairs.residuals);
    if (!(worst <= this.options.tolerance * this.norm)) throw this.failure(worst);
    return pairs;
  }

  /** Lanczos on −A. Returns the pairs when they are good already, or the space is exhausted. */
  private plain(
    krylov: Krylov,
    count: number,
    steps: number,
    outside: readonly Float64Array[],
  ): Pairs | null {
    const { op } = this;
    while (krylov.size < steps) {
      krylov.step((x, out) => op.combine(x, x, -1, 0, 0, out));
      this.products++;
      this.look(this.done);
    }
    const ritz = krylov.ritz();
    const m = krylov.size;
    this.norm = Math.max(this.norm, Math.abs(ritz.values[m - 1]!));
    const edge = -ritz.values[m - 1]! + Math.max(ritz.residuals[m - 1]!, 0.01 * this.norm);
    this.top = Math.max(this.top, Math.min(op.norm, edge));
    const bar = this.options.tolerance * this.norm;
    const good = ritz.residuals.subarray(0, count).every((residual) => residual <= bar);
    if (!good && m + outside.length < op.n) return null;
    const span = Array.from({ length: count }, (_, r) =>
      krylov.combination(ritz.rows.subarray(r * m, (r + 1) * m)),
    );
    const pairs = rayleighRitz(op, span, outside, this.supply);
    this.products += count;
    if (pairs.residuals.every((residual) => residual <= bar)) return pairs;
    this.supply.give(...pairs.vectors);
    return null;
  }

  private firstFilter(
    krylov: Krylov,
    count: number,
    capacity: number,
    outside: readonly Float64Array[],
  ): Filter {
    const ritz = krylov.ritz();
    const last = ritz.values.length - 1;
    const low = -ritz.values[0]!;
    const wanted = this.valueAtRank(ritz, count);
    // Below the first few Ritz values nothing is known of the density.
    const cut = Math.max(this.valueAtRank(ritz, 2 * count + 6), -ritz.values[Math.min(last, 3)]!);
    const start = this.mixture(krylov, ritz, Math.min(last, count + 2), outside);
    this.restartFrom(krylov, start);
    return this.makeFilter(low, wanted, cut, capacity);
  }

  private restartFrom(krylov: Krylov, start: Float64Array): void {
    krylov.begin((first) => first.set(start));
    this.supply.give(start);
  }

  /**
   * The λ below which `rank` eigenvalues are to be expected: from the Lanczos quadrature of the spectral density with
   * one random vector (Golub & Meurant 1994; Lin, Saad & Yang 2016), half of each node's weight on either side of it.
   */
  private valueAtRank(ritz: { values: Float64Array; rows: Float64Array }, rank: number): number {
    const m = ritz.values.length;
    const aim = rank / this.op.n;
    let below = 0;
    for (let r = 0; r < m; r++) {
      const weight = ritz.rows[r * m]! ** 2;
      const here = below + weight / 2;
      const value = -ritz.values[r]!;
      if (here >= aim) {
        if (r === 0) return value;
        const before = -ritz.values[r - 1]!;
        const weightBefore = ritz.rows[(r - 1) * m]! ** 2;
        const there = below - weightBefore / 2;
        return before + ((aim - there) / (here - there)) * (value - before);
      }
      below += weight;
    }
    return -ritz.values[m - 1]!;
  }

  private makeFilter(low: number, wanted: number, cut: number, capacity: number): Filter {
    const a = Math.min(0.9 * this.top, Math.max(cut, wanted + 0.1 * (wanted - low), 1e-12 * this.top));
    return chebyshevFilter(
      this.op,
      a,
      this.top,
      low,
      chooseDegree(this.op, low, Math.min(wanted, 0.9 * a + 0.1 * low), a, this.top, capacity),
      this.spare,
    );
  }

  /** A start for a new Krylov space: the sum of the wanted Ritz vectors, so that nothing gained is lost. */
  private mixture(
    krylov: Krylov,
    ritz: { rows: Float64Array },
    parts: number,
    outside: readonly Float64Array[],
  ): Float64Array {
    const m = krylov.size;
    const row = new Float64Array(m);
    for (let r = 0; r < parts; r++) for (let j = 0; j < m; j++) row[j]! += ritz.rows[r * m + j]!;
    const start = this.supply.take();
    addCombination(krylov.basis, m, row, 1, start);
    orthogonalise(start, outside);
    scale(start, 1 / norm(start));
    return start;
  }

  /**
   * Estimates of ‖A x − λ x‖ from the residuals of the filtered operator, as if all of the error lay next to λ:
   * on the low side, so what they promise is checked, and the next check waits until they have fallen in proportion.
   */
  private estimates(
    ritz: { values: Float64Array; residuals: Float64Array },
    count: number,
    filter: Filter,
  ): number[] {
    return Array.from({ length: count }, (_, i) => {
      const value = ritz.values[i]!;
      return value > 1 ? ritz.residuals[i]! / filter.slope(value) : Infinity;
    });
  }

  private counted(filter: Filter): (x: Float64Array, out: Float64Array) => void {
    return (x, out) => {
      filter.apply(x, out);
      this.products += filter.degree;
    };
  }

  private look(done: number): void {
    if (this.watch?.cancelled?.()) throw new CancelledError();
    this.watch?.progress?.(done, 'Eigenvectors');
    if (this.products > this.limit) throw this.failure(NaN);
  }

  private failure(residual: number): NotConvergedError {
    return new NotConvergedError(
      `The eigenvectors did not settle within ${this.products} products.`,
      residual,
    );
  }
}
