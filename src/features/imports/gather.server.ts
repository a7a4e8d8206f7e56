import { openFile, isGraphLayout, type OpenedFile } from '@/features/files/index.server';
import type { Import } from '@/server/models';
import type { JobContext } from '@/server/queue';
import { getObject } from '@/server/storage';
import { fileErrors, type RowSink } from '@/features/files';
import { IdTable } from './id-table';
import type { FileRole, ImportLimits, ImportOptions } from './imports';
import { MappingReader } from './mapping';
import { MembersReader } from './members';
import { Problems } from './problems';
import { TiesReader } from './ties';

/** The files of an import after they were looked at, before their rows are read. */
export interface OpenedFiles {
  readonly files: Partial<Record<FileRole, OpenedFile>>;
  readonly notes: string[];
}

/** The rows of all files, read. */
export interface Gathered {
  readonly table: IdTable;
  readonly mapping: MappingReader | null;
  readonly members: MembersReader | null;
  readonly ties: TiesReader;
  readonly problems: Problems;
}

/** Each file is read twice, some three or four times; the bar counts bytes over all passes. */
const PASSES = 2;

/** Tells how far the reading is; never backwards, also where a file turns out to need more passes. */
export class ReadingProgress {
  private bytes = 0;
  private told = 0;
  private step = 'Looking at the files';
  constructor(
    private total: number,
    private readonly report: JobContext['progress'],
    private readonly share: number,
  ) {
    this.total = Math.max(1, total * PASSES);
  }
  more(bytes: number): void {
    this.total += bytes;
  }
  read(count: number, step = this.step): void {
    this.bytes += count;
    this.step = step;
    this.told = Math.max(this.told, this.share * Math.min(1, this.bytes / this.total));
    this.report(this.told, step);
  }
}

/** Looks at every file: encoding, format, checksum. */
export async function openFiles(
  row: Import,
  options: ImportOptions,
  limits: ImportLimits,
  progress: ReadingProgress,
  signal: AbortSignal,
): Promise<OpenedFiles> {
  const files: Partial<Record<FileRole, OpenedFile>> = {};
  const notes: string[] = [];
  for (const { role, key, bytes } of row.files) {
    const file = await openFile({
      what: role,
      open: () => getObject(key),
      settings: options.reading[role] ?? {},
      limits,
      onBytes: (count) => progress.read(count),
      signal,
    });
    if (file.layout.format !== 'delimited') progress.more(bytes);
    if (role === 'ties' && isGraphLayout(file) && !row.files.some((one) => one.role === 'members'))
      progress.more(bytes);
    if (file.note) notes.push(file.note);
    files[role] = file;
  }
  return { files, notes };
}

/**
 * Reads the rows of all files. Members come first, in the order of their file, then those that only the ties name.
 * @param beforeMembers may place members of an earlier snapshot, knowing the changed ids
 */
export async function readRows(
  { files }: OpenedFiles,
  options: ImportOptions,
  takenOn: string,
  limits: ImportLimits,
  progress: ReadingProgress,
  beforeMembers: (mapping: MappingReader | null, table: IdTable) => void,
): Promise<Gathered> {
  const table = new IdTable();
  const problems = new Problems();
  const read = async (
    file: OpenedFile,
    side: 'ties' | 'members',
    what: string,
    reader: RowSink & { read: number },
  ): Promise<void> => {
    reading = () => progress.read(0, `Reading ${what}, row ${reader.read.toLocaleString('en-GB')}`);
    await file.rows(side, counting(reader));
  };
  let reading = (): void => undefined;
  const counting = (sink: RowSink): RowSink => {
    let rows = 0;
    const tick = (): void => {
      if (++rows % TELL_EVERY === 0) reading();
    };
    return {
      header: (cells) => sink.header(cells),
      row: (cells, line) => (tick(), sink.row(cells, line)),
      broken: (line, value, reason) => (tick(), sink.broken(line, value, reason)),
    };
  };
  const mapping = files.mapping ? new MappingReader(options, problems, limits) : null;
  if (files.mapping && mapping) await read(files.mapping, 'ties', 'changed ids', mapping);
  beforeMembers(mapping, table);
  const graph = files.ties && isGraphLayout(files.ties) ? files.ties : null;
  const membersFile = files.members ?? graph;
  const members = membersFile ? new MembersReader(table, options, problems, takenOn, limits) : null;
  if (membersFile && members) await read(membersFile, 'members', 'members', members);
  if (files.members && members!.read === 0) throw fileErrors.noRows('members');
  const ties = new TiesReader(table, options, problems, takenOn, limits);
  await read(files.ties!, 'ties', 'ties', ties);
  if (ties.read === 0) throw fileErrors.noRows('ties');
  return { table, mapping, members, ties, problems };
}

const TELL_EVERY = 5_000;
