/** What is planted in the Saltmarsh scenario: everything invented, in one place. */

export const SNAPSHOTS = [
  { takenOn: '2025-08-31', label: 'August 2025' },
  { takenOn: '2025-11-30', label: 'November 2025' },
  { takenOn: '2026-02-28', label: 'February 2026' },
  { takenOn: '2026-05-31', label: 'May 2026' },
  { takenOn: '2026-08-31', label: 'August 2026' },
  { takenOn: '2026-11-28', label: 'November 2026' },
] as const;
export const LAST = SNAPSHOTS.length - 1;

/** Ties between distinct pairs in the last snapshot. */
export const TIES = 6978;

export interface GroupPlan {
  readonly name: string;
  /** Members in the last snapshot, branches included. */
  readonly size: number;
  /** Members in each thin branch. */
  readonly branches: readonly number[];
  readonly helpfulness: number;
  /** Change of helpfulness from one snapshot to the next. */
  readonly rise: number;
  readonly complaints: number;
  readonly belonging: number;
  readonly belongingRise: number;
}

const group = (
  name: string,
  size: number,
  branches: readonly number[],
  [helpfulness, rise]: readonly [number, number],
  complaints: number,
  [belonging, belongingRise]: readonly [number, number],
): GroupPlan => ({ name, size, branches, helpfulness, rise, complaints, belonging, belongingRise });

export const GROUPS: readonly GroupPlan[] = [
  group('Seed Library', 228, [5, 2], [3.95, 0.03], 1.3, [75, 0.2]),
  group('North Plots', 201, [4], [3.62, 0.01], 2.0, [69, 0]),
  group('Bean Keepers', 174, [3], [4.1, 0.06], 1.5, [78, 0.5]),
  group('Grafters', 156, [], [3.74, 0.02], 1.9, [66, -0.2]),
  group('New Arrivals', 147, [6], [2.98, 0.01], 2.9, [49, -1.6]),
  group('Market Table', 130, [3], [3.68, 0.01], 2.3, [66, -0.1]),
  group('Tool Shed', 114, [2], [3.58, 0], 2.0, [71, 0.1]),
  group('Night Composters', 96, [4], [2.66, -0.01], 3.8, [47, -0.6]),
];
export const NEW_ARRIVALS = 4;

/** Ties per 1,000 possible pairs, groups in the order above. */
export const DENSITY: readonly (readonly number[])[] = [
  [55, 1.0, 2.5, 0.4, 1.8, 2.6, 3.5, 0],
  [1.0, 48, 0.1, 0, 1.0, 0.1, 4.1, 0],
  [2.5, 0.1, 64, 2.1, 0, 0.5, 2.3, 0.3],
  [0.4, 0, 2.1, 68, 0, 1.7, 0.1, 1.1],
  [1.8, 1.0, 0, 0, 56, 0.3, 0.1, 0.1],
  [2.6, 0.1, 0.5, 1.7, 0.3, 66, 0.1, 0],
  [3.5, 4.1, 2.3, 0.1, 0.1, 0.1, 72, 0],
  [0, 0, 0.3, 1.1, 0.1, 0, 0, 63],
];

/** The weak seam: these two groups had more ties across before. */
export const SEAM = { from: 7, to: 3, lostTies: 26 } as const;

/** Members of each small part that is tied to nobody else, and members without any tie. */
export const ISLETS: readonly number[] = [5, 4, 3, 2, 2];
export const ISOLATED = 2;

/** Members that joined (and still are there) and members that left between a snapshot and the one before it. */
export const JOINS: readonly number[] = [0, 36, 40, 48, 40, 47];
export const LEAVES: readonly number[] = [0, 15, 22, 12, 20, 18];
/** Share of those who join that belong to New Arrivals. */
export const NEWCOMERS = 0.5;

/** Share of members with an answer to the belonging survey; share without a helpfulness score. */
export const SURVEYED = 0.61;
export const UNSCORED = 0.04;

export interface NamedPlan {
  readonly handle: string;
  readonly group: number;
  /** Wanted number of ties; the member that comes closest is taken. */
  readonly ties: number;
  readonly months?: number;
  /** Planted departure of helpfulness in the last snapshot. */
  readonly shift: number;
}

/** Departures with a known handle. */
export const NAMED: readonly NamedPlan[] = [
  { handle: 'quiet-fern', group: 2, ties: 15, months: 31, shift: -1.5 },
  { handle: 'wild-dibber', group: 1, ties: 9, months: 27, shift: -1.75 },
  { handle: 'late-dibber', group: 1, ties: 10, months: 29, shift: -1.7 },
  { handle: 'plum-quince', group: 4, ties: 8, months: 8, shift: -1.6 },
  { handle: 'rusty-leek', group: 3, ties: 34, months: 30, shift: -1.55 },
  { handle: 'tall-sloe', group: 0, ties: 44, shift: -1.4 },
  { handle: 'mossy-lantern', group: 5, ties: 11, months: 32, shift: -1.4 },
  { handle: 'rusty-medlar', group: 5, ties: 14, shift: 1.25 },
  { handle: 'north-damson', group: 7, ties: 9, months: 19, shift: -1.55 },
  { handle: 'nimble-lantern', group: 4, ties: 12, months: 16, shift: -1.25 },
];
/** Helpfulness of quiet-fern, one a snapshot: down over the last five. */
export const QUIET_FERN = [4.05, 4.02, 3.74, 3.37, 2.96, 2.58] as const;
/** Planted departures in all, and the fewest ties that a departing member has. */
export const DEPARTURES = 30;
export const DEPARTURE_TIES = 8;
