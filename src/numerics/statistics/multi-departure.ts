import { UnanswerableError, type Watch } from '../types';
import { consistencyFactor, smallSampleFactor } from './covariance-factors';
import { checkValues } from './deviations';
import { benjaminiHochberg, median } from './false-discovery';
import { chiSquaredP, chiSquaredQuantile } from './gamma';
import { COVERED, coveredCount, minimumCovariance, SingularError } from './minimum-covariance';
import {
  factorised,
  isSingular,
  scatterOf,
  squaredDistance,
  squaredDistances,
  type Scatter,
  type Singular,
} from './scatter';

export interface MultiDeparture {
  /** Robust Mahalanobis distance of each member; NaN where not tested. */
  readonly distance: Float64Array;
  /** Attributes that a member was measured in: the degrees of freedom of its p; 0 where not tested. */
  readonly degrees: Int32Array;
  /** P(χ² > distance²); NaN where not tested. */
  readonly p: Float64Array;
  /** Benjamini & Hochberg over the tested members; NaN where not tested. */
  readonly q: Float64Array;
  /** Reweighted centre, length k, and covariance, k × k row-major, in the units of the columns. */
  readonly centre: Float64Array;
  readonly covariance: Float64Array;
  /** Members with all attributes, from which both were estimated, and those of them with weight 1. */
  readonly complete: number;
  readonly kept: number;
  readonly tested: number;
  readonly notes: readonly string[];
}

/** Rows within this quantile of the raw distances are kept (Rousseeuw & Van Driessen 1999). */
const KEPT = 0.975;
/** Members an attribute below which chi-squared is noticeably too short in the tail. */
const CAREFUL = 50;

/**
 * Who departs in several attributes at once: robust Mahalanobis distances by the reweighted minimum covariance
 * determinant (Rousseeuw & Van Driessen 1999) over 75 % of the members with all attributes, with the consistency factors
 * of Croux & Haesbroeck 1999 and the small-sample factors of Pison, Van Aelst & Willems 2002. p is the upper tail of
 * chi-squared. With few members the distances of those outside the covered ones have a longer tail (Hardin & Rocke 2005):
 * of Gaussian members p ≤ 1 % came for 5.9 % with 20 members and 3 attributes, 2.8 % with 60 and 4, 1.5 % with 200 and
 * 4, 1.0 % from 1,000 and 5 on; below 50 members an attribute a note says so.
 *
 * A member without some of the attributes is measured in those there are, with their block of the covariance and as
 * many degrees of freedom, which is exact for Gaussian departures missing at random; one without any is not tested.
 *
 * @param columns k columns of n standardised departures, NaN where not tested; no unit is assumed
 * @param options.names the attributes, for the words of a refusal
 * @throws UnanswerableError `no-attributes`; `bad-values` on infinite values and those beyond 1e100; `too-few-observed` unless k < complete
 *   members / 5; `constant-attribute` or `collinear-attribute`, with its name, when 75 % of them lie on a hyperplane
 */
export function multiDeparture(
  columns: readonly Float64Array[],
  options: { readonly names?: readonly string[]; readonly seed: number },
  watch?: Watch,
): MultiDeparture {
  const k = columns.length;
  const n = columns[0]?.length ?? 0;
  checkColumns(columns);
  const rows = Int32Array.from({ length: n }, (_, i) => i).filter((i) =>
    columns.every((column) => !Number.isNaN(column[i]!)),
  );
  if (!(k < rows.length / 5))
    throw new UnanswerableError(
      'too-few-observed',
      `${rows.length} members have all ${k} attributes; more than ${5 * k} are needed to compare them.`,
    );
  const units = columns.map((column, a) => unitOf(column, rows, nameOf(options.names, a)));
  const z = new Float64Array(rows.length * k);
  rows.forEach((i, at) =>
    units.forEach(({ middle, unit }, a) => (z[at * k + a] = (columns[a]![i]! - middle) / unit)),
  );

  const { scatter, kept } = refusing(options.names, () => reweighted(z, k, options.seed, watch));
  const distance = new Float64Array(n).fill(NaN);
  const degrees = new Int32Array(n);
  const p = new Float64Array(n).fill(NaN);
  const blocks = new Map<string, Scatter>();
  for (let i = 0; i < n; i++) {
    const there = [...columns.keys()].filter((a) => !Number.isNaN(columns[a]![i]!));
    if (there.length === 0) continue;
    const key = there.join();
    const block = blocks.get(key) ?? blockOf(scatter, there);
    blocks.set(key, block);
    const own = Float64Array.from(there, (a) => (columns[a]![i]! - units[a]!.middle) / units[a]!.unit);
    const squared = squaredDistance(own, 0, block, new Float64Array(there.length));
    distance[i] = Math.sqrt(squared);
    degrees[i] = there.length;
    p[i] = chiSquaredP(squared, there.length);
  }
  return {
    distance,
    degrees,
    p,
    q: benjaminiHochberg(p),
    centre: Float64Array.from(units, ({ middle, unit }, a) => middle + unit * scatter.centre[a]!),
    covariance: scatter.covariance.map(
      (one, at) => one * units[Math.floor(at / k)]!.unit * units[at % k]!.unit,
    ),
    complete: rows.length,
    kept,
    tested: degrees.reduce((sum, one) => sum + (one > 0 ? 1 : 0), 0),
    notes:
      rows.length < CAREFUL * k
        ? [
            'With so few members beside the number of attributes, the smallest p are smaller than they should be.',
          ]
        : [],
  };
}

/** The reweighted estimate: mean and covariance of the rows within the 97.5 % quantile of the raw one. */
function reweighted(
  z: Float64Array,
  k: number,
  seed: number,
  watch?: Watch,
): { scatter: Scatter; kept: number } {
  const n = z.length / k;
  const raw = minimumCovariance(z, k, seed, watch);
  const factor = consistencyFactor(k, coveredCount(n, k) / n) * smallSampleFactor('raw', n, k, COVERED);
  const line = factor * chiSquaredQuantile(KEPT, k);
  const distances = squaredDistances(z, raw);
  const near = Int32Array.from(distances.keys()).filter((i) => distances[i]! <= line);
  const found = scatterOf(z, k, near);
  if (isSingular(found)) throw new SingularError(found);
  const again = consistencyFactor(k, KEPT) * smallSampleFactor('reweighted', n, k, COVERED);
  const scaled = factorised(
    found.centre,
    found.covariance.map((one) => again * one),
  );
  if (isSingular(scaled)) throw new SingularError(scaled);
  return { scatter: scaled, kept: near.length };
}

function blockOf({ centre, covariance }: Scatter, there: readonly number[]): Scatter {
  const k = centre.length;
  const some = Float64Array.from(there.flatMap((a) => there.map((b) => covariance[a * k + b]!)));
  // A block of a matrix of full rank has full rank.
  return factorised(
    Float64Array.from(there, (a) => centre[a]!),
    some,
  ) as Scatter;
}

const nameOf = (names: readonly string[] | undefined, a: number): string =>
  names?.[a] === undefined ? `attribute ${a + 1}` : `“${names[a]}”`;

function checkColumns(columns: readonly Float64Array[]): void {
  if (columns.length === 0)
    throw new UnanswerableError('no-attributes', 'Choose at least one attribute to compare members by.');
  columns.forEach((column) => {
    if (column.length !== columns[0]!.length)
      throw new UnanswerableError('bad-values', 'The attributes are not of the same members.');
    checkValues(column);
  });
}

/** Median and a spread of a column, so that all columns are of about the same size; any other choice gives the same distances. */
function unitOf(column: Float64Array, rows: Int32Array, name: string): { middle: number; unit: number } {
  const some = Float64Array.from(rows, (i) => column[i]!);
  const middle = median(some);
  const off = some.map((one) => Math.abs(one - middle));
  const size = off.reduce((most, one) => Math.max(most, one), 0);
  const unit = median(off) || size;
  if (!(unit > 1e-12 * Math.abs(middle)) || !Number.isFinite(size)) {
    throw new UnanswerableError(
      'constant-attribute',
      `The departures in ${name} are all equal, so they cannot tell members apart; leave it out.`,
    );
  }
  return { middle, unit };
}

function refusing<T>(names: readonly string[] | undefined, run: () => T): T {
  try {
    return run();
  } catch (error) {
    if (error instanceof SingularError) throw refusal(error.singular, names);
    throw error;
  }
}

function refusal({ column, constant }: Singular, names: readonly string[] | undefined): UnanswerableError {
  const name = nameOf(names, column);
  return constant
    ? new UnanswerableError(
        'constant-attribute',
        `The departures in ${name} are equal for at least three in four members, so they have no spread to measure by; leave it out.`,
      )
    : new UnanswerableError(
        'collinear-attribute',
        `For at least three in four members ${name} follows from the attributes before it (${[
          ...Array(column).keys(),
        ]
          .map((a) => nameOf(names, a))
          .join(', ')}); leave one of them out.`,
      );
}
