import type { Random } from '../random';
import { UnanswerableError } from '../types';

export interface KMeans {
  readonly labels: Int32Array;
  /** k × width, row-major. */
  readonly centres: Float64Array;
  /** Sum of squared distances to the centres. */
  readonly inertia: number;
}

const maximumIterations = 100;

/**
 * k-means by Lloyd's iteration from k-means++ starts (Arthur & Vassilvitskii 2007), the best of several.
 * Above `sample` points the starts are tried on a seeded sample and the best is then settled on all points.
 *
 * @param points count × width, row-major, finite
 * @param k number of groups, 1 or more; groups stay empty when there are fewer distinct points
 * @throws UnanswerableError `bad-values` when a coordinate is not finite; `bad-k`
 */
export function kMeans(
  points: Float64Array,
  width: number,
  k: number,
  random: Random,
  { restarts = 20, sample = 10_000 } = {},
): KMeans {
  if (!points.every(Number.isFinite))
    throw new UnanswerableError('bad-values', 'Members can only be grouped by finite coordinates.');
  if (!Number.isInteger(k) || k < 1 || !(restarts >= 1))
    throw new UnanswerableError('bad-k', 'The number of groups must be a whole number of 1 or more.');
  const count = points.length / width;
  const tried = count > sample ? pick(points, width, count, sample, random) : points;
  let best: KMeans | null = null;
  for (let attempt = 0; attempt < restarts; attempt++) {
    const result = lloyd(tried, width, plusPlus(tried, width, k, random));
    if (best === null || result.inertia < best.inertia) best = result;
  }
  return tried === points ? best! : lloyd(points, width, best!.centres);
}

function pick(
  points: Float64Array,
  width: number,
  count: number,
  size: number,
  random: Random,
): Float64Array {
  const chosen = random.shuffle(Int32Array.from({ length: count }, (_, i) => i)).subarray(0, size);
  const some = new Float64Array(size * width);
  chosen.forEach((i, at) => some.set(points.subarray(i * width, (i + 1) * width), at * width));
  return some;
}

function plusPlus(points: Float64Array, width: number, k: number, random: Random): Float64Array {
  const count = points.length / width;
  const centres = new Float64Array(k * width);
  const distance = new Float64Array(count).fill(Infinity);
  let next = random.int(count);
  for (let c = 0; c < k; c++) {
    centres.set(points.subarray(next * width, (next + 1) * width), c * width);
    let total = 0;
    for (let i = 0; i < count; i++) {
      const d = squared(points, i * width, centres, c * width, width);
      if (d < distance[i]!) distance[i] = d;
      total += distance[i]!;
    }
    // With all points on centres already any one will do.
    let left = random.next() * total;
    next = total > 0 ? count - 1 : random.int(count);
    for (let i = 0; total > 0 && i < count; i++) {
      left -= distance[i]!;
      if (left < 0) {
        next = i;
        break;
      }
    }
  }
  return centres;
}

function lloyd(points: Float64Array, width: number, start: Float64Array): KMeans {
  const count = points.length / width;
  const k = start.length / width;
  const centres = start.slice();
  const labels = new Int32Array(count).fill(-1);
  const sizes = new Int32Array(k);
  let inertia = 0;
  for (let iteration = 0; iteration < maximumIterations; iteration++) {
    let moved = 0;
    inertia = 0;
    for (let i = 0; i < count; i++) {
      let best = 0;
      let least = Infinity;
      for (let c = 0; c < k; c++) {
        const d = squared(points, i * width, centres, c * width, width);
        if (d < least) {
          least = d;
          best = c;
        }
      }
      inertia += least;
      if (labels[i] !== best) {
        labels[i] = best;
        moved++;
      }
    }
    if (moved === 0) break;
    const sums = new Float64Array(k * width);
    sizes.fill(0);
    for (let i = 0; i < count; i++) {
      const c = labels[i]!;
      sizes[c]!++;
      for (let x = 0; x < width; x++) sums[c * width + x]! += points[i * width + x]!;
    }
    // An empty group keeps its old centre.
    for (let c = 0; c < k; c++)
      if (sizes[c]! > 0)
        for (let x = 0; x < width; x++) centres[c * width + x] = sums[c * width + x]! / sizes[c]!;
  }
  return { labels, centres, inertia };
}

function squared(points: Float64Array, p: number, centres: Float64Array, c: number, width: number): number {
  let sum = 0;
  for (let x = 0; x < width; x++) {
    const d = points[p + x]! - centres[c + x]!;
    sum += d * d;
  }
  return sum;
}
