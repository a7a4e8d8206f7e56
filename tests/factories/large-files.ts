import { createRandom } from '@/numerics';

export interface LargeFiles {
  readonly ties: string;
  readonly members: string;
  readonly counts: { readonly members: number; readonly ties: number };
}

/** Two files of an invented community that take a few seconds to import and to read, so that both can be interrupted. */
export function largeFiles(members = 12_000, tiesEach = 6, seed = 1): LargeFiles {
  const random = createRandom(seed);
  const groups = 12;
  const pairs = new Set<string>();
  for (let i = 0; i < members; i++) {
    for (let k = 0; k < tiesEach; k++) {
      // Mostly within one's own group (i mod 12), so that there is something to find.
      const other =
        random.next() < 0.85
          ? (i + groups * (1 + Math.floor((random.next() * members) / groups))) % members
          : Math.floor(random.next() * members);
      if (other !== i) pairs.add(i < other ? `m${i},m${other}` : `m${other},m${i}`);
    }
  }
  const scores = Array.from({ length: members }, (_, i) => {
    const score = (i % groups) / 4 + random.next() + random.next();
    return `m${i},${random.next() < 0.1 ? '' : score.toFixed(3)}`;
  });
  return {
    ties: `source,target\n${[...pairs].join('\n')}\n`,
    members: `id,score\n${scores.join('\n')}\n`,
    counts: { members, ties: pairs.size },
  };
}
