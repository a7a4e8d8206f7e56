import { QueryTypes, type Transaction } from 'sequelize';
import { deleteObject, getObject } from '@/server/storage';
import { Import, sequelize, Snapshot, type JobResult } from '@/server/models';
import type { JobContext, JobHandler } from '@/server/queue';
import { runInThread } from '@/server/threads/run-in-thread';
import { audit } from '@/features/workspaces/index.server';
import type { Shape } from '@/features/network';
import { landSnapshot } from '@/features/network/index.server';
import { combineTies } from './combine';
import { importErrors } from './errors';
import { importOptionsSchema, type ImportCounts, type ImportOptions, type ImportProblem } from './imports';
import { IdTable, MembersReader } from './members';
import { Problems } from './problems';
import { readRows } from './rows.server';
import { inspectText, openText } from './text.server';
import { TiesReader } from './ties';
import { warningsFor } from './warnings';

const CHUNK = 5_000;
/** Shares of the progress bar: reading the files, working out the shape, writing rows. */
const READ = 0.4;
const SHAPED = 0.6;

interface ReadFiles {
  readonly table: IdTable;
  readonly members: MembersReader | null;
  readonly ties: TiesReader;
  readonly problems: Problems;
  readonly notes: string[];
}

/** Streams both files through their readers; progress is the share of bytes read. */
async function readFiles(
  row: Import,
  options: ImportOptions,
  takenOn: string,
  context: JobContext,
): Promise<ReadFiles> {
  const total = row.files.reduce((sum, file) => sum + file.bytes, 0);
  const table = new IdTable();
  const problems = new Problems();
  const notes: string[] = [];
  let bytes = 0;
  const readFile = async (role: 'ties' | 'members', reader: MembersReader | TiesReader): Promise<void> => {
    const file = row.files.find((one) => one.role === role)!;
    const open = () => getObject(file.key);
    const info = await inspectText(open, role);
    if (info.warning) notes.push(info.warning);
    const text = await openText(open, info, role, (count) => {
      bytes += count;
      context.progress((READ * bytes) / total, `Reading ${role}, row ${reader.read.toLocaleString('en-GB')}`);
    });
    await readRows(text, info.delimiter, role, reader, context.signal);
    if (reader.read === 0) throw importErrors.noRows(role);
  };
  const hasMembers = row.files.some((file) => file.role === 'members');
  const members = hasMembers ? new MembersReader(table, options, problems) : null;
  if (members) await readFile('members', members);
  const ties = new TiesReader(table, options, problems, takenOn);
  await readFile('ties', ties);
  return { table, members, ties, problems, notes };
}

function countsOf(
  { members, ties, table }: ReadFiles,
  kept: number,
  leftOut: number,
  blankCells: number,
): ImportCounts {
  const { read, refused, selfTies } = ties;
  const counts: ImportCounts = {
    tieRows: { read, kept, merged: read - refused - selfTies - leftOut - kept, refused, selfTies, leftOut },
    memberRows: {
      read: members?.read ?? 0,
      kept: members?.kept ?? 0,
      refused: members?.refused ?? 0,
      blankCells,
      refusedCells: members?.refusedCells ?? 0,
    },
    membersFromTies: table.ids.length - (members?.kept ?? 0),
  };
  const { memberRows } = counts;
  // Rows in = rows kept + merged + refused, always; anything else is a row lost in silence.
  if (counts.tieRows.merged < 0 || memberRows.read !== memberRows.kept + memberRows.refused)
    throw new Error('import counts do not add up');
  return counts;
}

/** Removes what an interrupted run left, and whatever an ended import must not keep. */
async function clear(importId: string, transaction?: Transaction): Promise<void> {
  const options = transaction ? { transaction } : {};
  await Snapshot.destroy({ where: { importId, state: 'pending' }, ...options });
  await sequelize.query('DELETE FROM import_problems WHERE import_id = $1', { bind: [importId], ...options });
}

async function saveProblems(
  importId: string,
  problems: readonly ImportProblem[],
  transaction: Transaction,
): Promise<void> {
  for (let from = 0; from < problems.length; from += CHUNK) {
    const part = problems.slice(from, from + CHUNK);
    await sequelize.query(
      `INSERT INTO import_problems (import_id, ordinal, file, line, "column", value, reason)
       SELECT $1, * FROM unnest($2::int[], $3::text[], $4::int[], $5::text[], $6::text[], $7::text[])`,
      {
        bind: [
          importId,
          part.map((_, i) => from + i),
          part.map((one) => one.file),
          part.map((one) => one.line),
          part.map((one) => one.column),
          part.map((one) => one.value),
          part.map((one) => one.reason),
        ],
        type: QueryTypes.INSERT,
        transaction,
      },
    );
  }
}

export const dropFiles = async (row: Import): Promise<void> => {
  await Promise.all(row.files.map((file) => deleteObject(file.key).catch(() => undefined)));
};

const today = (): string => new Date().toISOString().slice(0, 10);

/** What an import has made already: by a run that was interrupted after its commit, or by another run of the job. */
async function madeBefore(importId: string): Promise<JobResult | null> {
  const row = await Import.findByPk(importId);
  if (!row?.snapshotId) return null;
  await dropFiles(row);
  return row.state === 'review'
    ? { kind: 'import', id: row.id, href: `/api/v1/imports/${row.id}` }
    : { kind: 'snapshot', id: row.snapshotId, href: `/api/v1/snapshots/${row.snapshotId}` };
}

/** Turns the uploaded files into a snapshot, whole or not at all; run again it starts from a clean slate. */
export const importJob: JobHandler = async (context) => {
  const before = await madeBefore(context.targetId);
  if (before) return before;
  try {
    await makeSnapshot(context);
  } catch (error) {
    // One snapshot an import: a run that comes second fails on it, or on files that are gone, and is done all the same.
    const made = await madeBefore(context.targetId);
    if (made) return made;
    throw error;
  }
  return madeBefore(context.targetId);
};

async function makeSnapshot(context: JobContext): Promise<void> {
  const row = await Import.findByPk(context.targetId);
  if (!row || row.state === 'discarded') return;
  await clear(row.id);
  await Import.update({ state: 'checking' }, { where: { id: row.id, state: 'received' } });
  const options = importOptionsSchema.parse(row.options);
  const takenOn = options.takenOn ?? today();
  const files = await readFiles(row, options, takenOn, context);
  const attributes = files.members?.finish() ?? [];
  const rows = files.ties.finish();
  const n = files.table.ids.length;
  const combined = combineTies(rows, n, options);
  const counts = countsOf(files, combined.sources.length, combined.leftOut, files.members?.blankCells ?? 0);
  const problemsTotal = files.problems.total;
  if (combined.sources.length === 0) {
    await sequelize.transaction(async (transaction) => {
      await saveProblems(row.id, files.problems.kept, transaction);
      await row.update({ counts, problemsTotal }, { transaction });
    });
    throw importErrors.noTiesLeft();
  }
  const { sources, targets, weights } = combined;
  const shape = await runInThread<Shape>(
    'shape',
    { n, sources, targets, weights },
    {
      signal: context.signal,
      progress: (done, step) => context.progress(READ + (SHAPED - READ) * done, step),
    },
  );
  const warnings = warningsFor({
    ids: files.table.ids,
    inMembersFile: files.members?.kept ?? 0,
    shape,
    attributes,
    spaced: files.table.spaced,
    notes: [...files.notes, ...(files.members?.notes ?? [])],
  });
  const review = options.accept === 'review';
  await sequelize.transaction(async (transaction) => {
    const landed = await landSnapshot(
      {
        workspaceId: row.workspaceId,
        communityId: row.communityId,
        importId: row.id,
        createdBy: row.createdBy,
        takenOn,
        label: options.label ?? takenOn,
        state: review ? 'pending' : 'ready',
        ids: files.table.ids,
        names: files.members?.names ?? [],
        shape,
        ties: { ...combined, kinds: (tie) => rows.kinds[combined.kindOf[tie]! - 1] ?? null },
        attributes,
      },
      (done, step) => {
        if (context.signal.aborted) throw Object.assign(new Error('Stopped.'), { name: 'AbortError' });
        context.progress(SHAPED + (1 - SHAPED) * done, step);
      },
      transaction,
    );
    await saveProblems(row.id, files.problems.kept, transaction);
    await row.update(
      {
        state: review ? 'review' : 'accepted',
        counts: { ...counts },
        warnings,
        problemsTotal,
        snapshotId: landed.id,
        finishedAt: new Date(),
      },
      { transaction },
    );
    await audit(
      {
        workspaceId: row.workspaceId,
        actorId: row.createdBy,
        action: review ? 'import.check' : 'import.accept',
        targetKind: 'import',
        targetId: row.id,
        detail: { snapshotId: landed.id },
      },
      transaction,
    );
  });
  // The planner has never seen these rows; without this its first guesses are poor.
  await sequelize.query('ANALYZE snapshot_members, ties, attribute_values').catch(() => undefined);
}

/** Marks an import whose job ended without a snapshot; keeps its problems, removes its files. */
export async function importEnded(importId: string, state: 'failed' | 'cancelled'): Promise<void> {
  const row = await Import.findByPk(importId);
  if (!row) return;
  await Snapshot.destroy({ where: { importId, state: 'pending' } });
  await row.update({ state, finishedAt: new Date(), snapshotId: null });
  await dropFiles(row);
}
