import { Snapshot } from '@/server/models';
import { wholeSnapshot, type WholeSnapshot } from '@/features/network/index.server';
import type { EarlierMembers } from './assemble';
import { addToEarlier, type CombinedTies } from './combine';
import { importErrors } from './errors';
import type { IdTable } from './id-table';
import type { ImportOptions } from './imports';
import type { MappingReader } from './mapping';

const DAY = 86_400_000;

/** The snapshot that changes are added to: the one asked for, or the newest. @throws ProblemError 422 without one */
export async function earlierSnapshot(communityId: string, options: ImportOptions): Promise<WholeSnapshot> {
  const row = await Snapshot.findOne({
    where: { communityId, state: 'ready', ...(options.base ? { id: options.base } : {}) },
    order: [
      ['takenOn', 'DESC'],
      ['createdAt', 'DESC'],
    ],
  });
  if (!row) throw importErrors.noBase();
  return wholeSnapshot(row);
}

/** Gives the members of the earlier snapshot the first places, under their present ids. */
export function placeEarlier(earlier: WholeSnapshot, mapping: MappingReader | null, table: IdTable): void {
  const before = new Set(earlier.ids);
  const presentOf = new Map(
    [...(mapping?.holding([], before) ?? [])].map(([present, former]) => [former, present]),
  );
  for (const id of earlier.ids) table.place(presentOf.get(id) ?? id);
}

export const earlierMembers = (earlier: WholeSnapshot): EarlierMembers => ({
  names: earlier.names,
  attributes: earlier.attributes,
});

/** Ties of the earlier snapshot with those of the files added, and how many of them rows of the files went into. */
export function withEarlierTies(
  earlier: WholeSnapshot,
  fresh: CombinedTies,
  n: number,
  takenOn: string,
  options: ImportOptions,
): CombinedTies & { touched: number } {
  const days = Math.max(0, (Date.parse(takenOn) - Date.parse(earlier.takenOn)) / DAY);
  const age = options.halfLifeDays === null ? 0 : days / options.halfLifeDays;
  return addToEarlier(earlier.ties, fresh, n, age, options);
}
