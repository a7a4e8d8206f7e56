import { describe, expect, test } from 'vitest';
import {
  erfc,
  globalStatistics,
  laplacianOperator,
  localMoran,
  localPermutations,
  median,
  observedTies,
  QUADRANTS,
  spectrum,
  takeReading,
  type LaplacianKind,
  type ReadingFilter,
  type ReadingResult,
} from '@/numerics';
import { loadReference, numericSignal, referenceNames, type Expected, type Reference } from './load';

/**
 * Every expected value about attributes is either compared, by the rule and tolerance that stand beside it, or listed
 * here with the reason; a key that neither knows fails.
 */
const NOT_OFFERED: readonly (readonly [RegExp, string])[] = [
  [/\.smoothness\.tv_/, 'total variations are not among the quantities of a reading'],
  [/(moran|geary)_.+\.(var|z)_norm$/, 'moments under normality are not offered, those of randomisation are'],
  [/moran_.+\.(S0|S1|S2|kurtosis_b2)$/, 'parts of the variance, which is compared'],
  [/\.moran_W_perm\.(nsim|mean|var)$/, 'informational'],
  [/\.local_.\.(E_total|var_total)$/, 'total randomisation is not offered, conditional is'],
  [/\.local_W\.perm_nsim$/, 'the size of the file’s own simulation'],
  [/\.(flag_threshold|alpha_grid|smoother|ideal_cutoff_between)$|\.outliers\.alpha$|\.ideal_K$/, 'input'],
  [/\.outliers_neighbour_mean\./, 'a rival of the smoother, compared in the benchmark only'],
  [/\.detection\./, 'a count of the file’s own flags against its planted members'],
  [
    /^missing\..+\.(harmonic|rmse_harmonic|observed_mean|rmse_observed_mean|undefined|missing)$/,
    'rivals, input',
  ],
];

const LAPLACIANS: Record<string, LaplacianKind> = { L: 'combinatorial', Lsym: 'normalised' };
const ROUNDS = 999;

type Computed = number | string | null | readonly unknown[] | ArrayLike<number>;

/** What the product says of one signal, each part computed once. */
class Answers {
  private readonly kept = new Map<string, unknown>();
  readonly values: Float64Array;

  constructor(
    readonly reference: Reference,
    readonly name: string,
  ) {
    this.values = numericSignal(reference, name);
  }

  once<T>(key: string, make: () => T): T {
    if (!this.kept.has(key)) this.kept.set(key, make());
    return this.kept.get(key) as T;
  }

  read(filter: ReadingFilter, laplacian: LaplacianKind = 'combinatorial'): ReadingResult {
    return this.once(JSON.stringify([filter, laplacian]), () =>
      takeReading(this.reference.network, {
        values: this.values,
        precision: null,
        groups: null,
        filter,
        laplacian,
        neighbourFloor: 1,
        permutations: 0,
        seed: 1,
      }),
    );
  }

  get ties() {
    return this.once('ties', () => observedTies(this.reference.network, this.values));
  }

  /** Members without an observed neighbour are left out of n under `adjust_n`, and counted under the other keys. */
  global(letter: string, adjusted: boolean, permutations = 0) {
    const style = letter === 'W' ? 'row' : 'raw';
    return this.once(`global ${letter} ${adjusted} ${permutations}`, () =>
      globalStatistics(
        adjusted ? this.ties : observedTies(this.reference.network, this.values, 'counted'),
        style,
        permutations,
        7,
      ),
    );
  }

  local(letter: string) {
    const style = letter === 'W' ? 'row' : 'raw';
    return this.once(`local ${letter}`, () => localMoran(this.ties, this.reference.n, style));
  }

  shuffled() {
    return this.once('shuffled', () => localPermutations(this.ties, this.reference.n, ROUNDS, 11));
  }

  expected(key: string): unknown {
    return this.reference.expected[`signals.${this.name}.${key}`]?.value;
  }
}

/** Departures by hand: robust z about their median, flags above 3.5, all from the product's left-out departures. */
function outliers(
  departure: Float64Array,
  part: string,
  smoothed: Float64Array,
  values: Float64Array,
): Computed {
  const centre = median(departure);
  const spread = 1.4826 * median(departure.map((one) => Math.abs(one - centre)));
  const z = departure.map((one) => (one - centre) / spread);
  const parts: Record<string, () => Computed> = {
    residual: () => values.map((one, i) => one - smoothed[i]!),
    loo_residual: () => departure,
    loo_median: () => centre,
    mad_scaled: () => spread,
    robust_z: () => z,
    flagged: () => [...z.keys()].filter((i) => Math.abs(z[i]!) > 3.5),
  };
  return parts[part]!();
}

function globalPart(answers: Answers, [kind, letter, adjust, part]: readonly string[]): Computed | undefined {
  const statistic = answers.global(letter!, adjust !== '')[kind === 'moran' ? 'moran' : 'geary'];
  const parts: Record<string, () => number> = {
    I: () => statistic.value,
    C: () => statistic.value,
    E_I: () => statistic.expectation,
    E_C: () => statistic.expectation,
    var_rand: () => statistic.variance,
    z_rand: () => statistic.z,
    p_greater_rand: () => erfc(statistic.z / Math.SQRT2) / 2,
    p_two_sided_rand: () => statistic.p,
    n_used: () => statistic.n,
  };
  return parts[part!]?.();
}

function localPart(answers: Answers, letter: string, part: string): Computed | undefined {
  const local = answers.local(letter);
  const parts: Record<string, () => Computed> = {
    I: () => local.I,
    E_cond: () => local.expectation,
    var_cond: () => local.variance,
    z_cond: () => local.z,
    p_cond_two_sided: () => local.p,
    q_BH: () => local.q,
    quadrant: () => [...local.quadrant].map((one) => QUADRANTS[one] ?? ''),
    n_tests: () => local.p.filter((one) => !Number.isNaN(one)).length,
    rejected_q05: () => local.q.filter((one) => one <= 0.05).length,
    perm_p_greater: () => answers.shuffled().greater,
    perm_p_less: () => answers.shuffled().less,
    perm_p_folded: () => answers.shuffled().folded,
    perm_p_two_sided: () => answers.shuffled().twoSided,
  };
  return parts[part]?.();
}

/** Energy of the signal in each eigenspace, as the file lists them. */
function energies(answers: Answers, l: string): number[] {
  const { network, n } = answers.reference;
  const { values, vectors } = answers.once(`spectrum ${l}`, () =>
    spectrum(network, { laplacian: LAPLACIANS[l]!, count: 'all' }),
  );
  const out: number[] = [];
  values.forEach((value, k) => {
    let along = 0;
    for (let i = 0; i < n; i++) along += vectors[k]![i]! * answers.values[i]!;
    const same = k > 0 && value - values[k - 1]! < 1e-7 * Math.max(1, value);
    if (same) out[out.length - 1]! += along * along;
    else out.push(along * along);
  });
  return out;
}

function smoothness(answers: Answers, part: string): number {
  const { values } = answers;
  const { network, n } = answers.reference;
  const out = new Float64Array(n);
  laplacianOperator(network, part === 'xLsymx' ? 'normalised' : 'combinatorial').multiply(values, out);
  const form = out.reduce((sum, one, i) => sum + one * values[i]!, 0);
  if (part === 'xLx_over_xx') return form / values.reduce((sum, one) => sum + one * one, 0);
  return part === 'xLx_centred_rayleigh'
    ? answers.read({ kind: 'tikhonov', alpha: 1 }).smoothness.rayleigh
    : form;
}

/** The product's answer to one key; undefined for a key that it does not know. */
function answer(answers: Answers, key: string): Computed | undefined {
  const filter = /^filters\.(tikhonov|heat|ideal)_(Lsym|L)_(?:alpha|tau|keep)(.+)$/.exec(key);
  if (filter) {
    const [, kind, l, amount] = filter;
    const number = Number(amount!.replace('_', '.'));
    const chosen: ReadingFilter =
      kind === 'tikhonov'
        ? { kind, alpha: number }
        : kind === 'heat'
          ? { kind, tau: number }
          : { kind: 'low-pass', keep: answers.expected('ideal_K') as number };
    return answers.read(chosen, LAPLACIANS[l!]).columns.smoothed;
  }
  const regularised = /^regularised_alpha(.+)$/.exec(key);
  if (regularised) {
    const { smoothed } = answers.read({
      kind: 'tikhonov',
      alpha: Number(regularised[1]!.replace('_', '.')),
    }).columns;
    const places = answers.reference.expected[`missing.${answers.name}.missing`]!.value as number[];
    return places.map((i) => smoothed[i]!);
  }
  if (key === 'rmse_regularised_alpha1') {
    const { smoothed } = answers.read({ kind: 'tikhonov', alpha: 1 }).columns;
    const whole = numericSignal(answers.reference, answers.name.replace(/_missing$/, ''));
    const listed = (part: string): number[] =>
      answers.reference.expected[`missing.${answers.name}.${part}`]!.value as number[];
    const places = listed('missing').filter((i) => !listed('undefined').includes(i));
    return Math.sqrt(places.reduce((sum, i) => sum + (smoothed[i]! - whole[i]!) ** 2, 0) / places.length);
  }
  const whole = /^(?:complete_case_)?(moran|geary)_([WB])(_adjust_n|)\.(.+)$/.exec(key);
  if (whole) return globalPart(answers, whole.slice(1));
  if (key === 'moran_W_perm.p_greater') {
    // Ours counts both sides; the file's signals that are shared have nothing on the other side.
    const { moran } = answers.global('W', true, ROUNDS);
    return moran.z > 3 ? moran.permutationP : null;
  }
  const local = /^local_([WB])\.(.+)$/.exec(key);
  if (local) return localPart(answers, local[1]!, local[2]!);
  const gft = /^gft_(Lsym|L)\.(eigenspaces|energy_total)$/.exec(key);
  if (gft) {
    const found = energies(answers, gft[1]!);
    return gft[2] === 'eigenspaces' ? found : found.reduce((sum, one) => sum + one, 0);
  }
  const even = /^smoothness\.(xLx|xLsymx|xLx_over_xx|xLx_centred_rayleigh)$/.exec(key);
  if (even) return smoothness(answers, even[1]!);
  const departures = /^outliers(_loocv)?\.(.+)$/.exec(key);
  if (!departures) return undefined;
  const [, loocv = '', part] = departures;
  const departed = (alpha: number) => answers.read({ kind: 'tikhonov', alpha }).columns;
  if (part === 'leverage') return departed(answers.expected('outliers.alpha') as number).leverage;
  if (part === 'loocv' || (loocv && part === 'alpha')) {
    const grid = answers.expected('outliers_loocv.alpha_grid') as number[];
    const errors = grid.map((alpha) => {
      const known = departed(alpha).departure.filter((one) => !Number.isNaN(one));
      return known.reduce((sum, one) => sum + one * one, 0) / known.length;
    });
    if (part === 'loocv') return errors;
    // On a complete network all strengths are equally good, and rounding chose the file's.
    const theirs = answers.expected('outliers_loocv.alpha') as number;
    const least = Math.min(...errors);
    return errors[grid.indexOf(theirs)]! <= least * (1 + 1e-9) ? theirs : grid[errors.indexOf(least)]!;
  }
  const { departure, smoothed } = departed(answers.expected(`outliers${loocv}.alpha`) as number);
  return outliers(departure, part!, smoothed, answers.values);
}

/** Monte Carlo bound of the files: 5 standard errors of the difference, and the +1 rule. */
function monteCarlo(p: number, rule: string): number {
  const theirs = Number(/1\/(\d+)\)\)/.exec(rule)![1]);
  return 5 * Math.sqrt(p * (1 - p) * (1 / ROUNDS + 1 / theirs)) + 2 / (ROUNDS + 1);
}

function check(key: string, actual: Computed, { value, tolerance, compare }: Expected): void {
  const list = (of: unknown): unknown[] =>
    typeof of === 'object' && of !== null ? Array.from(of as ArrayLike<unknown>) : [of];
  const expected = list(value).map((one) =>
    compare.startsWith('abs per eigenspace') ? (one as { energy: number }).energy : one,
  );
  const found = list(actual);
  expect(found.length, `${key}: length`).toBe(expected.length);
  expected.forEach((one, i) => {
    const mine = found[i];
    if (one === null)
      expect(mine === null || Number.isNaN(mine), `${key}[${i}] is undefined, not ${String(mine)}`).toBe(
        true,
      );
    else if (compare === 'exact') expect(mine, `${key}[${i}]`).toEqual(one);
    else {
      // The bound is one of a counted share; the two-sided p is twice such a share.
      const half = key.endsWith('perm_p_two_sided') ? 0.5 : 1;
      const number = half * (one as number);
      const allowed = compare.startsWith('abs')
        ? tolerance!
        : compare.startsWith('rel')
          ? tolerance! * Math.abs(number)
          : compare.startsWith('Monte Carlo')
            ? monteCarlo(number, compare)
            : NaN;
      expect(
        Math.abs(half * (mine as number) - number),
        `${key}[${i}] ${String(mine)} ${number}`,
      ).toBeLessThanOrEqual(allowed);
    }
  });
}

describe.each(referenceNames.map((name) => [name, loadReference(name)] as const))(
  '%s',
  (_name, reference) => {
    const keys = Object.keys(reference.expected);
    const about = new Map<string, [string, string][]>();
    for (const key of keys) {
      const [, name, rest] = /^(?:signals|missing)\.([^.]+)\.(.+)$/.exec(key) ?? [];
      if (name && rest) about.set(name, [...(about.get(name) ?? []), [key, rest]]);
      const [, published, part] = /^published\.moran_W\((.+)\)\.(.+)$/.exec(key) ?? [];
      if (published) about.set(published, [...(about.get(published) ?? []), [key, `moran_W.${part}`]]);
    }
    test.each([...about.keys()])('%s', (name) => {
      const answers = new Answers(reference, name);
      let compared = 0;
      for (const [key, rest] of about.get(name)!) {
        if (NOT_OFFERED.some(([pattern]) => pattern.test(key))) continue;
        const actual = answer(answers, rest);
        expect(actual, `unknown key ${key}`).toBeDefined();
        if (rest === 'moran_W_perm.p_greater' && actual === null) continue;
        check(key, actual!, reference.expected[key]!);
        compared++;
      }
      expect(compared).toBeGreaterThan(5);
    });
  },
);
