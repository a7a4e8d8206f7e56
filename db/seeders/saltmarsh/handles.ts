import type { Random } from '../../../src/numerics/random';
import { ADJECTIVES, NOUNS } from './words';

/** A distinct handle such as `quiet-fern` for each of `count` members; some are given. */
export function makeHandles(random: Random, count: number, given: ReadonlyMap<number, string>): string[] {
  const taken = new Set(given.values());
  const all = ADJECTIVES.flatMap((adjective) => NOUNS.map((noun) => `${adjective}-${noun}`)).filter(
    (handle) => !taken.has(handle),
  );
  random.shuffle(all);
  return Array.from({ length: count }, (_, i) => given.get(i) ?? all[i]!);
}
