import type { Assembled } from './assemble';
import type { ImportCounts } from './imports';
import type { MappingReader } from './mapping';
import type { MembersReader } from './members';
import type { TiesReader } from './ties';

interface Counted {
  readonly ties: Pick<TiesReader, 'read' | 'refused' | 'selfTies'>;
  readonly members: Pick<MembersReader, 'read' | 'kept' | 'refused' | 'blankCells' | 'refusedCells'> | null;
  readonly mapping: Pick<MappingReader, 'read' | 'kept' | 'refused'> | null;
  /** Ties that rows of the file went into, and all ties of the snapshot. */
  readonly touched: number;
  readonly carriedOver: { readonly members: number; readonly ties: number } | null;
  readonly assembled: Pick<Assembled, 'ids' | 'leftOut'> & { readonly ties: { readonly leftOut: number } };
}

/**
 * What became of every row. Rows in = rows kept + merged + refused + left out, always: anything else is a row lost in
 * silence, and stops the import.
 */
export function countRows({
  ties,
  members,
  mapping,
  touched,
  carriedOver,
  assembled,
}: Counted): ImportCounts {
  const { read, refused, selfTies } = ties;
  const { leftOut } = assembled;
  const merged = read - refused - selfTies - assembled.ties.leftOut - touched;
  const memberRows = {
    read: members?.read ?? 0,
    kept: (members?.kept ?? 0) - leftOut.file,
    refused: members?.refused ?? 0,
    leftOut: leftOut.file,
    blankCells: members?.blankCells ?? 0,
    refusedCells: members?.refusedCells ?? 0,
  };
  const earlier = (carriedOver?.members ?? 0) - leftOut.earlier;
  const counts: ImportCounts = {
    tieRows: { read, kept: touched, merged, refused, selfTies, leftOut: assembled.ties.leftOut },
    memberRows,
    membersFromTies: Math.max(0, assembled.ids.length - memberRows.kept - earlier),
    ...(mapping ? { mappingRows: { read: mapping.read, kept: mapping.kept, refused: mapping.refused } } : {}),
    ...(carriedOver ? { carriedOver: { ...carriedOver } } : {}),
  };
  const sound =
    merged >= 0 &&
    memberRows.kept >= 0 &&
    memberRows.read === memberRows.kept + memberRows.refused + memberRows.leftOut &&
    (!mapping || mapping.read === mapping.kept + mapping.refused);
  if (!sound) throw new Error('import counts do not add up');
  return counts;
}
