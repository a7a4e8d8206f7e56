import { createRandom, type Random } from '../random';
import { CancelledError, NotConvergedError, type Watch } from '../types';
import { isSingular, scatterOf, squaredDistances, type Scatter, type Singular } from './scatter';

/** The share of the rows that the covariance is of: withstands 25 % of wild rows (Croux & Haesbroeck 1999). */
export const COVERED = 0.75;
const STARTS = 500;
const BEST = 10;
/** Larger samples start from up to five parts of this many rows. */
const PART = 300;
const PARTS = 5;
const CEILING = 500;

/** Thrown inside when more rows than are covered lie on one hyperplane. */
export class SingularError extends Error {
  constructor(readonly singular: Singular) {
    super('Singular scatter.');
  }
}

/** h of n rows in k columns: ⌊2 ⌊(n+k+1)/2⌋ − n + 2 (n − ⌊(n+k+1)/2⌋) · share⌋ (Rousseeuw & Van Driessen 1999). */
export function coveredCount(n: number, k: number): number {
  const half = Math.floor((n + k + 1) / 2);
  return Math.min(n, Math.floor(2 * half - n + 2 * (n - half) * COVERED));
}

/** The h rows with the smallest distances, in ascending order; the lowest rows where distances are equal. */
function nearest(distances: Float64Array, h: number): Int32Array {
  const edge = Float64Array.from(distances).sort()[h - 1]!;
  const out = new Int32Array(h);
  let below = 0;
  for (const d of distances) if (d < edge) below++;
  let equal = h - below;
  let at = 0;
  for (let i = 0; i < distances.length && at < h; i++) {
    if (distances[i]! < edge) out[at++] = i;
    else if (distances[i] === edge && equal > 0) {
      out[at++] = i;
      equal--;
    }
  }
  return out;
}

/** Rows of a matrix as a matrix of their own. */
function pick(rows: Float64Array, k: number, chosen: Int32Array): Float64Array {
  const out = new Float64Array(chosen.length * k);
  chosen.forEach((i, at) => out.set(rows.subarray(i * k, (i + 1) * k), at * k));
  return out;
}

/** Concentration: the covariance of the h nearest rows has no larger determinant (Rousseeuw & Van Driessen 1999). */
function concentrate(
  rows: Float64Array,
  k: number,
  h: number,
  from: Scatter,
  steps: number,
): Scatter | Singular {
  let scatter = from;
  for (let step = 0; step < steps; step++) {
    const next = scatterOf(rows, k, nearest(squaredDistances(rows, scatter), h));
    if (isSingular(next)) return next;
    if (next.logDeterminant >= scatter.logDeterminant - 1e-13 && step > 0) return next;
    scatter = next;
  }
  if (steps === CEILING)
    throw new NotConvergedError('The robust covariance did not settle.', scatter.logDeterminant);
  return scatter;
}

/** k + 1 random rows, and more where those do not span. */
function start(rows: Float64Array, k: number, random: Random, order: Int32Array): Scatter {
  const n = order.length;
  for (let a = 0; a < n; a++) {
    const b = a + random.int(n - a);
    const held = order[a]!;
    order[a] = order[b]!;
    order[b] = held;
    if (a < k) continue;
    const found = scatterOf(rows, k, order.subarray(0, a + 1));
    if (!isSingular(found)) return found;
    // A few more rows cannot help where everything is alike: look at all of them at once.
    if (a > 2 * k + 20) break;
  }
  const found = scatterOf(rows, k, order);
  if (isSingular(found)) throw new SingularError(found);
  return found;
}

const lowest = (all: Scatter[]): Scatter[] =>
  all.sort((a, b) => a.logDeterminant - b.logDeterminant).slice(0, BEST);

/** Best of some starts after two steps each. Starts that end on a hyperplane are dropped, or refused on all rows. */
function search(
  rows: Float64Array,
  k: number,
  h: number,
  from: Iterable<Scatter>,
  whole: boolean,
): Scatter[] {
  const out: Scatter[] = [];
  let fault: Singular | null = null;
  for (const one of from) {
    const found = concentrate(rows, k, h, one, 2);
    if (!isSingular(found)) out.push(found);
    else if (whole) throw new SingularError(found);
    else fault = found;
  }
  if (out.length === 0 && fault) throw new SingularError(fault);
  return lowest(out);
}

function* starts(
  rows: Float64Array,
  k: number,
  count: number,
  random: Random,
  watch?: Watch,
): Generator<Scatter> {
  const order = Int32Array.from({ length: rows.length / k }, (_, i) => i);
  for (let s = 0; s < count; s++) {
    if (s % 20 === 0 && watch?.cancelled?.()) throw new CancelledError();
    yield start(rows, k, random, order);
  }
}

/**
 * Minimum covariance determinant by FAST-MCD (Rousseeuw & Van Driessen 1999): 500 random starts of k + 1 rows, two
 * concentration steps each, the ten best to the end; above 600 rows nested in five parts of at most 300. The raw mean
 * and covariance of the h covered rows, without factors.
 *
 * @param rows n × k, row-major, finite, columns of about the same size
 * @throws SingularError when h rows lie on a hyperplane
 */
export function minimumCovariance(rows: Float64Array, k: number, seed: number, watch?: Watch): Scatter {
  const n = rows.length / k;
  const h = coveredCount(n, k);
  const random = createRandom(seed);
  let best: Scatter[];
  if (n <= 2 * PART) {
    best = search(rows, k, h, starts(rows, k, STARTS, random, watch), true);
  } else {
    const order = random.shuffle(Int32Array.from({ length: n }, (_, i) => i));
    const parts = Math.min(PARTS, Math.floor(n / PART));
    const size = Math.min(PART, Math.floor(n / parts));
    const share = h / n;
    const found: Scatter[] = [];
    for (let part = 0; part < parts; part++) {
      watch?.progress?.((0.6 * part) / parts, 'Looking for the usual members');
      const some = pick(rows, k, order.subarray(part * size, (part + 1) * size));
      const from = starts(some, k, Math.ceil(STARTS / parts), random, watch);
      found.push(...search(some, k, Math.ceil(size * share), from, false));
    }
    const merged = pick(rows, k, order.subarray(0, parts * size));
    const together = search(merged, k, Math.ceil(parts * size * share), found, false);
    best = search(rows, k, h, together, true);
  }
  watch?.progress?.(0.8, 'Looking for the usual members');
  // Ten to the end on small samples; on large ones the best alone, as in the article.
  const ends = (n <= 5_000 ? best : best.slice(0, 1)).map((one) => {
    const end = concentrate(rows, k, h, one, CEILING);
    if (isSingular(end)) throw new SingularError(end);
    return end;
  });
  return lowest(ends)[0]!;
}
