import { fromSpectral, toSpectral, type ExactBasis } from './exact-basis';
import { groupColumns, type Fit, type Problem } from './model';
import { pseudoInverse, quadraticForm, times } from './small-matrix';

const inner = (a: Float64Array, b: Float64Array): number => {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
};

/**
 * The exact smoother on an eigenbasis, in variables scaled by √s. Members in `zeroed` have weight 0: their rows
 * are taken out by a low-rank correction (Woodbury), so that the basis serves every round of the robust fit.
 * K = (W + αM)⁻¹ with W the identity less the zeroed members; P = W − W K W.
 */
export class ExactSystem {
  private readonly zeroed: number[];
  private readonly weight: Float64Array;
  private readonly columns: Float64Array[];
  /** Spectral coordinates of W y and of W X. */
  private readonly yHat: Float64Array;
  private readonly xHat: Float64Array[];
  private readonly ys: Float64Array;
  private readonly xs: Float64Array[];
  private readonly fullColumns: Float64Array[];

  constructor(
    private readonly problem: Problem,
    private readonly basis: ExactBasis,
    zeroed: Uint8Array,
  ) {
    const { observed, root } = basis;
    this.zeroed = [...observed.keys()].filter((a) => zeroed[observed[a]!] === 1);
    this.weight = Float64Array.from(observed, (i) => (zeroed[i] === 1 ? 0 : 1));
    const live = Float64Array.from(problem.s, (s, i) => (zeroed[i] === 1 ? 0 : s));
    this.fullColumns = groupColumns(problem.groups, live);
    this.columns = this.fullColumns.map((column) => Float64Array.from(observed, (i) => column[i]!));
    const scaled = (v: ArrayLike<number>): Float64Array => Float64Array.from(root, (r, a) => r * v[a]!);
    this.ys = scaled(Float64Array.from(observed, (i) => problem.y[i]!));
    this.xs = this.columns.map(scaled);
    const transform = (v: Float64Array): Float64Array =>
      toSpectral(
        basis,
        v.map((one, a) => one * this.weight[a]!),
      );
    this.yHat = transform(this.ys);
    this.xHat = this.xs.map(transform);
  }

  private get size(): number {
    return this.basis.observed.length;
  }

  /** Diagonal of H = (I + αM)⁻¹ in the eigenbasis. */
  private filter(alpha: number): Float64Array {
    return this.basis.values.map((value) => 1 / (1 + alpha * value));
  }

  /** (I − EᵀHE)⁻¹ for the zeroed members E, and log |I − EᵀHE|. */
  private correction(d: Float64Array): { matrix: Float64Array; log: number } {
    const k = this.zeroed.length;
    const no = this.size;
    const a = new Float64Array(k * k);
    for (let i = 0; i < k; i++)
      for (let j = 0; j <= i; j++) {
        let sum = 0;
        for (let l = 0; l < no; l++)
          sum +=
            d[l]! *
            this.basis.vectors[l * no + this.zeroed[i]!]! *
            this.basis.vectors[l * no + this.zeroed[j]!]!;
        a[i * k + j] = (i === j ? 1 : 0) - sum;
        a[j * k + i] = a[i * k + j]!;
      }
    const { matrix, logDeterminant } = pseudoInverse(a, k);
    return { matrix, log: logDeterminant };
  }

  /** Eᵀ H v of spectral coordinates. */
  private atZeroed(d: Float64Array, v: Float64Array): Float64Array {
    const no = this.size;
    return Float64Array.from(this.zeroed, (i) => {
      let sum = 0;
      for (let l = 0; l < no; l++) sum += d[l]! * v[l]! * this.basis.vectors[l * no + i]!;
      return sum;
    });
  }

  /** Everything about a strength α that needs no member-wise result. */
  private normal(alpha: number) {
    const d = this.filter(alpha);
    const t = this.correction(d);
    const vectors = [this.yHat, ...this.xHat];
    const raw = [this.ys, ...this.xs];
    const held = vectors.map((v) => this.atZeroed(d, v));
    const product = (i: number, j: number): number => {
      let value = 0;
      for (let a = 0; a < this.size; a++) value += this.weight[a]! * raw[i]![a]! * raw[j]![a]!;
      for (let l = 0; l < this.size; l++) value -= d[l]! * vectors[i]![l]! * vectors[j]![l]!;
      return this.zeroed.length > 0 ? value - inner(held[i]!, times(t.matrix, held[j]!)) : value;
    };
    const g = this.xs.length;
    const xpx = new Float64Array(g * g);
    for (let i = 0; i < g; i++)
      for (let j = 0; j <= i; j++) {
        xpx[i * g + j] = product(i + 1, j + 1);
        xpx[j * g + i] = xpx[i * g + j]!;
      }
    const xpy = Float64Array.from({ length: g }, (_, i) => product(i + 1, 0));
    const c = pseudoInverse(xpx, g);
    const beta = times(c.matrix, xpy);
    const quadratic = Math.max(0, product(0, 0) - inner(beta, xpy));
    const degrees = this.size - this.zeroed.length - this.problem.nullity - c.rank;
    return { d, t, c, beta, quadratic, degrees };
  }

  /** −2 log restricted likelihood, σ² profiled out (Patterson & Thompson 1971), up to a constant. */
  criterion(alpha: number): number {
    const { t, c, quadratic, degrees } = this.normal(alpha);
    let log = t.log + c.logDeterminant - (this.size - this.problem.nullity) * Math.log(alpha);
    for (const value of this.basis.values) log += Math.log1p(alpha * value);
    return degrees * Math.log(quadratic / degrees) + log;
  }

  /** Generalised cross-validation (Golub, Heath & Wahba 1979), for a smoother without levels. */
  crossValidation(alpha: number): number {
    const { values } = this.basis;
    let rss = 0;
    let trace = 0;
    for (let l = 0; l < this.size; l++) {
      const d = 1 / (1 + alpha * values[l]!);
      rss += ((1 - d) * this.yHat[l]!) ** 2;
      trace += d;
    }
    const free = this.size - trace;
    return (this.size * rss) / (free * free);
  }

  /** K v for a vector over the observed members. */
  private apply(d: Float64Array, t: Float64Array, v: Float64Array): Float64Array {
    const hat = toSpectral(this.basis, v);
    const first = hat.map((one, l) => one * d[l]!);
    if (this.zeroed.length === 0) return fromSpectral(this.basis, first);
    const amount = times(t, this.atZeroed(d, hat));
    const no = this.size;
    for (let l = 0; l < no; l++) {
      let sum = 0;
      this.zeroed.forEach((i, k) => (sum += this.basis.vectors[l * no + i]! * amount[k]!));
      first[l]! += d[l]! * sum;
    }
    return fromSpectral(this.basis, first);
  }

  /** vᵀ K v. */
  private form(d: Float64Array, t: Float64Array, hat: Float64Array): number {
    let sum = 0;
    for (let l = 0; l < this.size; l++) sum += d[l]! * hat[l]! * hat[l]!;
    return this.zeroed.length > 0 ? sum + quadraticForm(t, this.atZeroed(d, hat)) : sum;
  }

  /** The whole fit at strength α. */
  fit(alpha: number): Fit {
    const { d, t, c, beta, quadratic, degrees } = this.normal(alpha);
    const { observed, missing, root, vectors, bridge, own } = this.basis;
    const no = this.size;
    const n = this.problem.l.n;
    const g = this.xs.length;
    const weighted = (v: Float64Array): Float64Array => v.map((one, a) => one * this.weight[a]!);
    const rest = this.ys.map(
      (one, a) => one - this.xs.reduce((sum, column, j) => sum + column[a]! * beta[j]!, 0),
    );
    const f = this.apply(d, t.matrix, weighted(rest)).map((one, a) => one / root[a]!);
    const fx = this.xs.map((column) =>
      this.apply(d, t.matrix, weighted(column)).map((one, a) => one / root[a]!),
    );
    const smoothed = new Float64Array(n);
    const variance = new Float64Array(n);
    const leverage = new Float64Array(n);
    const level = (i: number): number =>
      this.fullColumns.reduce((sum, column, j) => sum + column[i]! * beta[j]!, 0);
    const hat = new Float64Array(no);
    for (let a = 0; a < no; a++) {
      const i = observed[a]!;
      for (let l = 0; l < no; l++) hat[l] = vectors[l * no + a]!;
      const r = Float64Array.from({ length: g }, (_, j) => this.columns[j]![a]! - fx[j]![a]!);
      smoothed[i] = level(i) + f[a]!;
      variance[i] = this.form(d, t.matrix, hat) / (root[a]! * root[a]!) + quadraticForm(c.matrix, r);
      leverage[i] = this.weight[a]! * variance[i]! * root[a]! * root[a]!;
    }
    missing.forEach((i, u) => {
      let value = 0;
      const r = Float64Array.from(this.fullColumns, (column) => column[i]!);
      const b = new Float64Array(no);
      for (let a = 0; a < no; a++) {
        const link = -bridge[u * no + a]!;
        if (link === 0) continue;
        value += link * f[a]!;
        b[a] = link / root[a]!;
        for (let j = 0; j < g; j++) r[j]! -= link * fx[j]![a]!;
      }
      smoothed[i] = level(i) + value;
      variance[i] =
        own[u]! / alpha + this.form(d, t.matrix, toSpectral(this.basis, b)) + quadraticForm(c.matrix, r);
    });
    return {
      alpha,
      smoothed,
      variance,
      leverage,
      exact: new Uint8Array(n).fill(1),
      quadratic,
      degrees,
      residual: 0,
    };
  }
}
