import type { ImportCounts } from '../imports';

/** Counts by fate, as label and value. */
export function fates(counts: ImportCounts): [string, number][] {
  const { tieRows, memberRows, membersFromTies } = counts;
  const all: [string, number, boolean][] = [
    ['Tie rows read', tieRows.read, true],
    ['became ties', tieRows.kept, true],
    ['merged into them', tieRows.merged, tieRows.merged > 0],
    ['self-ties dropped', tieRows.selfTies, tieRows.selfTies > 0],
    ['left out by your choices', tieRows.leftOut, tieRows.leftOut > 0],
    ['refused', tieRows.refused, true],
    ['Member rows read', memberRows.read, true],
    ['kept', memberRows.kept, true],
    ['without ties, left out', memberRows.leftOut, memberRows.leftOut > 0],
    ['refused', memberRows.refused, true],
    ['blank cells', memberRows.blankCells, memberRows.blankCells > 0],
    ['cells refused and left blank', memberRows.refusedCells, memberRows.refusedCells > 0],
    ['Members only met in the ties', membersFromTies, true],
    ['Changed ids read', counts.mappingRows?.read ?? 0, !!counts.mappingRows],
    ['refused', counts.mappingRows?.refused ?? 0, !!counts.mappingRows],
    ['Members of the earlier snapshot', counts.carriedOver?.members ?? 0, !!counts.carriedOver],
    ['Ties of the earlier snapshot', counts.carriedOver?.ties ?? 0, !!counts.carriedOver],
  ];
  return all.filter(([, , shown]) => shown).map(([label, value]) => [label, value]);
}
