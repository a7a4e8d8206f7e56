import type { Random } from '../../../src/numerics/random';

/**
 * Bell-shaped draw of mean 0 and variance 1: twelve uniforms less six. Only additions, so that the same seed gives
 * the same bytes on any machine (a logarithm may differ in its last digit).
 */
export function bell(random: Random): number {
  let sum = -6;
  for (let i = 0; i < 12; i++) sum += random.next();
  return sum;
}

/** Skewed positive draw of mean 1: half the sum of two squared bells. */
export const skewed = (random: Random): number => (bell(random) ** 2 + bell(random) ** 2) / 2;

/** Heavy-tailed draw from 1 to `most`: a Pareto tail of exponent 2. */
export const heavy = (random: Random, most: number): number =>
  Math.min(most, 1 / Math.sqrt(1 - random.next()));

export const between = (random: Random, low: number, high: number): number =>
  low + (high - low) * random.next();

export const chance = (random: Random, share: number): boolean => random.next() < share;

export const pick = <T>(random: Random, from: readonly T[]): T => from[random.int(from.length)]!;

export const clamp = (value: number, low: number, high: number): number =>
  Math.min(high, Math.max(low, value));

/** Wave between −1 and 1 over a circle of length 1, made of straight lines. */
export function wave(place: number): number {
  const turn = place - Math.floor(place);
  return 4 * Math.abs(turn - 0.5) - 1;
}

/** Draws members with chances in proportion to their pull. */
export function picker(random: Random, members: readonly number[], pull: (member: number) => number) {
  const sums: number[] = [];
  let total = 0;
  for (const member of members) sums.push((total += pull(member)));
  return (): number => {
    const at = random.next() * total;
    let low = 0;
    let high = sums.length - 1;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (sums[middle]! > at) high = middle;
      else low = middle + 1;
    }
    return members[low]!;
  };
}
