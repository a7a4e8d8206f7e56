import type { RowSink, SampleTable } from '@/features/files';
import { ProblemError } from '@/lib/problem';
import { assemble } from '../../assemble';
import { combineTies } from '../../combine';
import { countRows } from '../../counts';
import { IdTable } from '../../id-table';
import { importOptionsSchema, type ImportCounts, type ImportLimits } from '../../imports';
import { MembersReader } from '../../members';
import { Problems } from '../../problems';
import { TiesReader } from '../../ties';
import { fileOf, tableOf, type Draft } from './draft';
import { toOptions } from './to-options';

/** What the choices make of the first rows: the same code as for the whole files. */
export interface Tried {
  readonly counts: ImportCounts;
  readonly problems: Problems;
  readonly members: number;
  readonly ties: number;
  /** Whether the first rows are all rows. */
  readonly whole: boolean;
}

function feed(table: SampleTable, sink: RowSink): void {
  sink.header([...table.headers]);
  for (const { line, value, reason } of table.broken) sink.broken(line, value, reason);
  for (const { cells, line } of table.rows) sink.row(cells, line);
}

/** Runs the import over the first rows of the files. @returns words where it cannot */
export function trySample(draft: Draft, limits: ImportLimits): Tried | string | null {
  const ties = tableOf(draft, 'ties');
  if (!ties) return null;
  const members = tableOf(draft, 'members');
  const parsed = importOptionsSchema.safeParse(toOptions(draft));
  if (!parsed.success) return parsed.error.issues[0]?.message ?? 'Please check the choices.';
  const options = parsed.data;
  const table = new IdTable();
  const problems = new Problems();
  try {
    const { takenOn } = draft.choices;
    const memberReader = members ? new MembersReader(table, options, problems, takenOn, limits) : null;
    if (members && memberReader) feed(members, memberReader);
    const tieReader = new TiesReader(table, options, problems, takenOn, limits);
    feed(ties, tieReader);
    const attributes = memberReader?.finish() ?? [];
    const combined = combineTies(tieReader.finish(), table.ids.length, options);
    const assembled = assemble({
      ids: table.ids,
      names: memberReader?.names ?? [],
      places: memberReader?.places ?? new Int32Array(),
      attributes,
      ties: combined,
      earlier: null,
      loners: options.loners,
    });
    const counts = countRows({
      ties: tieReader,
      members: memberReader,
      mapping: null,
      touched: combined.sources.length,
      carriedOver: null,
      assembled,
    });
    return {
      counts,
      problems,
      members: assembled.ids.length,
      ties: combined.sources.length,
      whole: (['ties', 'members'] as const).every((side) => fileOf(draft, side)?.whole ?? true),
    };
  } catch (error) {
    if (error instanceof ProblemError) return error.detail;
    throw error;
  }
}
