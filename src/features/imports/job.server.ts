import { Import, sequelize, Snapshot, type JobResult } from '@/server/models';
import type { JobContext, JobHandler } from '@/server/queue';
import { runInThread } from '@/server/threads/run-in-thread';
import { audit } from '@/features/workspaces/index.server';
import type { Shape } from '@/features/network';
import { landSnapshot, settleIds } from '@/features/network/index.server';
import { importErrors } from './errors';
import { dropFiles, removeHalf } from './files.server';
import { importOptionsSchema } from './imports';
import { prepare } from './prepare.server';
import { saveProblems } from './problem-rows.server';
import { warningsFor } from './warnings';

/** Shares of the progress bar: reading the files, working out the shape, writing rows. */
const READ = 0.4;
const SHAPED = 0.6;

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
  await removeHalf(row.id);
  await Import.update({ state: 'checking' }, { where: { id: row.id, state: 'received' } });
  const options = importOptionsSchema.parse(row.options);
  const takenOn = options.takenOn ?? today();
  const prepared = await prepare(row, options, takenOn, context, READ);
  const { problems, counts, assembled } = prepared;
  const report = {
    counts: { ...counts },
    problemsTotal: problems.total,
    problemKinds: problems.kinds.map((kind) => ({ ...kind })),
  };
  if (assembled.ties.sources.length === 0) {
    await sequelize.transaction(async (transaction) => {
      await saveProblems(row.id, problems.kept, transaction);
      await row.update(report, { transaction });
    });
    throw importErrors.noTiesLeft();
  }
  const { sources, targets, weights } = assembled.ties;
  const shape = await runInThread<Shape>(
    'shape',
    { n: assembled.ids.length, sources, targets, weights },
    {
      signal: context.signal,
      progress: (done, step) => context.progress(READ + (SHAPED - READ) * done, step),
    },
  );
  const warnings = warningsFor({ ...prepared, shape });
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
        shape,
        formerOf: prepared.formerOf,
        ...assembled,
      },
      (done, step) => {
        if (context.signal.aborted) throw Object.assign(new Error('Stopped.'), { name: 'AbortError' });
        context.progress(SHAPED + (1 - SHAPED) * done, step);
      },
      transaction,
    );
    if (!review && prepared.formerOf.size > 0) await settleIds(landed.id, transaction);
    await saveProblems(row.id, problems.kept, transaction);
    await row.update(
      {
        ...report,
        state: review ? 'review' : 'accepted',
        warnings,
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
