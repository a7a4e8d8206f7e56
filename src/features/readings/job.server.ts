import { ProblemError } from '@/lib/problem';
import { Reading, sequelize } from '@/server/models';
import type { JobHandler } from '@/server/queue';
import { runInThread } from '@/server/threads/run-in-thread';
import { smootherGroups } from '@/features/groupings/index.server';
import { loadAttribute, loadNetwork } from '@/features/network/index.server';
import type { ReadingInput, ReadingOutput } from './compute';
import type { ReadingFilter } from './filter';
import { saveMembers } from './insert.server';

interface Options {
  permutations: number;
  weightsId: string | null;
  neighbourFloor: number;
}

/** Tikhonov needs no groups: it copes with missing scores by itself. */
const needsGroups = (filter: ReadingFilter, values: Float64Array): boolean =>
  filter.kind === 'two-level' || (filter.kind !== 'tikhonov' && values.some(Number.isNaN));

/**
 * Computes a reading in a thread and writes its members and its result in one transaction. Running it again
 * replaces what was written before.
 */
export const readingJob: JobHandler = async ({ targetId, signal, progress }) => {
  const started = Date.now();
  const reading = await Reading.findByPk(targetId);
  if (!reading)
    throw new ProblemError(404, 'not-found', 'The reading is gone.', 'It was removed before it was taken.');
  const options = reading.options as unknown as Options;
  const filter = reading.filter as unknown as ReadingFilter;
  progress(0.01, 'Loading the network');
  const [net, values, precision] = await Promise.all([
    loadNetwork(reading.snapshotId),
    loadAttribute(reading.snapshotId, reading.attributeId),
    options.weightsId ? loadAttribute(reading.snapshotId, options.weightsId) : null,
  ]);
  const groups = needsGroups(filter, values)
    ? await smootherGroups(
        reading.snapshotId,
        net,
        filter.kind === 'two-level' ? (filter.groups ?? null) : null,
        { signal, progress: (done) => progress(0.05 + 0.3 * done, 'Finding groups for the levels') },
      )
    : null;
  const begin = groups ? 0.35 : 0.05;
  const input: ReadingInput = {
    net,
    values,
    precision,
    groups,
    filter,
    laplacian: reading.laplacian,
    neighbourFloor: options.neighbourFloor,
    permutations: options.permutations,
    seed: reading.seed,
  };
  const { columns, result } = await runInThread<ReadingOutput>('reading', input, {
    signal,
    progress: (done, step) => progress(begin + (0.93 - begin) * done, step),
  });
  progress(0.95, 'Saving');
  await sequelize.transaction(async (transaction) => {
    // Another run of this job waits here, and then replaces the rows instead of colliding with them.
    await reading.reload({ transaction, lock: transaction.LOCK.UPDATE });
    await saveMembers(targetId, columns, transaction);
    const seconds = (Date.now() - started) / 1000;
    await reading.update(
      { result: { ...result, seconds }, state: 'ready', finishedAt: new Date() },
      { transaction },
    );
    // A stop that arrives while rows are being written still leaves nothing behind.
    signal.throwIfAborted();
  });
  return { kind: 'reading', id: targetId, href: `/api/v1/readings/${targetId}` };
};

/** A stopped reading leaves nothing; a failed one stays in the list with its reason. */
export async function readingEnded(targetId: string, state: 'failed' | 'cancelled'): Promise<void> {
  if (state === 'cancelled') await Reading.destroy({ where: { id: targetId, state: 'queued' } });
  else await Reading.update({ state: 'failed', finishedAt: new Date() }, { where: { id: targetId } });
}
