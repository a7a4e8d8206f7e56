import type { Group, GroupingSummary } from '../groupings';

const CUT_WORDS = {
  sweep: 'cut where it is loosest',
  sign: 'cut by sign',
  median: 'cut in equal halves',
} as const;

export const LAPLACIAN_WORDS = {
  combinatorial: 'plain Laplacian',
  normalised: 'normalised Laplacian',
  regularised: 'regularised Laplacian',
} as const;

/** How a grouping was made, in plain words. */
export function methodWords({
  method,
  cut,
  laplacian,
}: Pick<GroupingSummary, 'method' | 'cut' | 'laplacian'>): string {
  if (method === 'louvain') return 'Louvain, a second opinion';
  const on = LAPLACIAN_WORDS[laplacian];
  return method === 'fiedler'
    ? `Split in two, ${CUT_WORDS[cut ?? 'sweep']}, ${on}`
    : `Spectral groups, ${on}`;
}

/** What a group is called where there is room for a word. */
export const groupTitle = ({ name, letter }: Pick<Group, 'name' | 'letter'>): string =>
  name ?? `Group ${letter}`;
