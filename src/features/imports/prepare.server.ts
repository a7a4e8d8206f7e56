import type { Import } from '@/server/models';
import type { JobContext } from '@/server/queue';
import { assemble, type Assembled } from './assemble';
import { combineTies, type CombinedTies } from './combine';
import { countRows } from './counts';
import { earlierMembers, earlierSnapshot, placeEarlier, withEarlierTies } from './earlier.server';
import { openFiles, readRows, ReadingProgress } from './gather.server';
import type { ImportCounts, ImportOptions } from './imports';
import { importLimits } from './limits.server';
import type { Problems } from './problems';

/** An import as it stands before the network is worked out and written. */
export interface Prepared {
  readonly assembled: Assembled;
  readonly counts: ImportCounts;
  readonly problems: Problems;
  /** Former ids by present ones, where they hold. */
  readonly formerOf: ReadonlyMap<string, string>;
  /** Members of the members file that have a tie. */
  readonly namedWithTie: number;
  readonly spaced: number;
  readonly notes: string[];
}

/** Reads the files of an import, and puts them together, over the earlier snapshot if they hold changes only. */
export async function prepare(
  row: Import,
  options: ImportOptions,
  takenOn: string,
  context: JobContext,
  share: number,
): Promise<Prepared> {
  const limits = importLimits();
  const bytes = row.files.reduce((sum, file) => sum + file.bytes, 0);
  const progress = new ReadingProgress(bytes, context.progress, share);
  const earlier = options.mode === 'changes' ? await earlierSnapshot(row.communityId, options) : null;
  const opened = await openFiles(row, options, limits, progress, context.signal);
  const gathered = await readRows(opened, options, takenOn, limits, progress, (mapping, table) => {
    if (earlier) placeEarlier(earlier, mapping, table);
  });
  const { table, mapping, members, ties, problems } = gathered;
  const attributes = members?.finish() ?? [];
  const rows = ties.finish();
  const n = table.ids.length;
  const choices = earlier ? { ...options, logWeight: false, minimumWeight: null } : options;
  const fresh = combineTies(rows, n, choices);
  const combined: CombinedTies & { touched: number } = earlier
    ? withEarlierTies(earlier, fresh, n, takenOn, options)
    : { ...fresh, touched: fresh.sources.length };
  const assembled = assemble({
    ids: table.ids,
    names: members?.names ?? [],
    places: members?.places ?? new Int32Array(),
    attributes,
    ties: combined,
    earlier: earlier && earlierMembers(earlier),
    loners: options.loners,
  });
  const counts = countRows({
    ties,
    members,
    mapping,
    touched: combined.touched,
    carriedOver: earlier && { members: earlier.ids.length, ties: earlier.ties.sources.length },
    assembled,
  });
  const formerOf = mapping?.holding(table.ids, new Set(earlier?.ids)) ?? new Map<string, string>();
  const notes = [...opened.notes, ...(members?.notes ?? [])];
  if (ties.commas > 0)
    notes.push(`${ties.commas.toLocaleString('en-GB')} weights were read with decimal commas.`);
  if (mapping && formerOf.size < mapping.kept)
    notes.push(
      `${(mapping.kept - formerOf.size).toLocaleString('en-GB')} changed ids were not used: the former id still occurs, or the present one was another member’s.`,
    );
  if (table.multiline > 0)
    notes.push(
      `${table.multiline.toLocaleString('en-GB')} ids hold a line end. If that is not meant, look for stray quotation marks.`,
    );
  for (const name of assembled.emptied)
    notes.push(`“${name}” has no value among members with ties and was left out.`);
  return {
    assembled,
    counts,
    problems,
    formerOf,
    namedWithTie: namedWithTie(members?.places ?? new Int32Array(), combined, n),
    spaced: table.spaced,
    notes,
  };
}

function namedWithTie(places: Int32Array, ties: CombinedTies, n: number): number {
  const tied = new Uint8Array(n);
  for (const ends of [ties.sources, ties.targets]) for (const end of ends) tied[end] = 1;
  return places.reduce((sum, place) => sum + tied[place]!, 0);
}
