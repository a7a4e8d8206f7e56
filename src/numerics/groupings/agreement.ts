import { UnanswerableError } from '../types';
import { groupCount } from './quality';

export interface Agreement {
  /** Hubert & Arabie 1985; 1 for equal groupings, about 0 for unrelated ones. */
  readonly adjustedRand: number;
  /** I(a; b) / ((H(a) + H(b)) / 2): normalised by the arithmetic mean. 1 when both have one single group. */
  readonly normalisedMutualInformation: number;
  /** Members that are in a group of both. */
  readonly members: number;
  /** Crossing table, made when it is asked for: counts[r][c] members are in group rows[r] of a and columns[c] of b. Groups without members are left out. */
  readonly table: {
    readonly rows: readonly number[];
    readonly columns: readonly number[];
    readonly counts: readonly (readonly number[])[];
  };
}

/**
 * Agreement of two groupings over the members that have a group (label ≥ 0) in both.
 * @throws UnanswerableError `no-overlap` when there is no such member
 */
export function agreement(a: Int32Array, b: Int32Array): Agreement {
  if (a.length !== b.length)
    throw new UnanswerableError('bad-labels', 'The two groupings are of different networks.');
  const columnsAll = Math.max(1, groupCount(b));
  const cells = new Map<number, number>();
  const rowSums = new Map<number, number>();
  const columnSums = new Map<number, number>();
  let members = 0;
  for (let i = 0; i < a.length; i++) {
    const r = a[i]!;
    const c = b[i]!;
    if (r < 0 || c < 0) continue;
    members++;
    add(cells, r * columnsAll + c);
    add(rowSums, r);
    add(columnSums, c);
  }
  if (members === 0) throw new UnanswerableError('no-overlap', 'No member has a group in both groupings.');
  const choose = (sums: Map<number, number>): number =>
    [...sums.values()].reduce((sum, x) => sum + (x * (x - 1)) / 2, 0);
  const same = choose(cells);
  const rowPairs = choose(rowSums);
  const columnPairs = choose(columnSums);
  const allPairs = (members * (members - 1)) / 2;
  const expected = allPairs === 0 ? 0 : (rowPairs * columnPairs) / allPairs;
  const most = (rowPairs + columnPairs) / 2;
  const adjustedRand = most === expected ? 1 : (same - expected) / (most - expected);

  let information = 0;
  for (const [key, count] of cells) {
    const r = rowSums.get(Math.floor(key / columnsAll))!;
    const c = columnSums.get(key % columnsAll)!;
    information += (count / members) * Math.log((count * members) / (r * c));
  }
  const mean = (entropy(rowSums, members) + entropy(columnSums, members)) / 2;
  const rows = [...rowSums.keys()].sort((x, y) => x - y);
  const columns = [...columnSums.keys()].sort((x, y) => x - y);
  return {
    adjustedRand,
    normalisedMutualInformation: mean === 0 ? 1 : Math.min(1, Math.max(0, information / mean)),
    members,
    // Only when asked for: thousands of islets on both sides make a table that fills the memory.
    get table() {
      return {
        rows,
        columns,
        counts: rows.map((r) => columns.map((c) => cells.get(r * columnsAll + c) ?? 0)),
      };
    },
  };
}

function add(sums: Map<number, number>, key: number): void {
  sums.set(key, (sums.get(key) ?? 0) + 1);
}

function entropy(sums: Map<number, number>, members: number): number {
  let h = 0;
  for (const x of sums.values()) h -= (x / members) * Math.log(x / members);
  return h;
}
