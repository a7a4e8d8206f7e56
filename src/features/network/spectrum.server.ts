import { ProblemError } from '@/lib/problem';
import { runInThread } from '@/server/threads/run-in-thread';
import { sequelize, SnapshotArray, type Snapshot } from '@/server/models';
import type { LaplacianKind } from '@/numerics/types';
import { loadArray, loadNetwork, saveArray } from './arrays.server';
import type { SpectrumResult } from './compute';
import type { SpectrumView } from './network';

/** Above this many members only the slowest frequencies are computed. */
const FULL_UP_TO = 2_000;
const MOST = 64;
let running = 0;

/**
 * Graph frequencies of a snapshot; computed once in a thread of this process, then kept with the snapshot.
 * @throws ProblemError 422 for more than 64 frequencies above 2,000 members, 429 while two others are computed
 */
export async function spectrumOf(
  snapshot: Snapshot,
  laplacian: LaplacianKind,
  asked: number,
): Promise<SpectrumView> {
  const count = Math.min(asked, snapshot.members);
  if (snapshot.members > FULL_UP_TO && count > MOST)
    throw new ProblemError(
      422,
      'too-many-frequencies',
      'This cannot be done as asked.',
      `A network of more than ${FULL_UP_TO} members gives at most ${MOST} frequencies.`,
    );
  const name = `spectrum:${laplacian}:${count}`;
  const kept = await SnapshotArray.findOne({
    where: { snapshotId: snapshot.id, name: `${name}:values` },
    attributes: ['name'],
  });
  if (kept) {
    const [values, residuals] = await Promise.all([
      loadArray(snapshot.id, `${name}:values`),
      loadArray(snapshot.id, `${name}:residuals`),
    ]);
    return {
      laplacian,
      values: [...values],
      residuals: [...residuals],
      complete: count === snapshot.members,
    };
  }
  if (running >= 2)
    throw new ProblemError(
      429,
      'busy',
      'Busy.',
      'Other spectra are being computed. Try again in a moment.',
      undefined,
      { 'retry-after': '5' },
    );
  running++;
  try {
    const network = await loadNetwork(snapshot.id);
    const result = await runInThread<SpectrumResult>('spectrum', { network, laplacian, count });
    await sequelize.transaction(async (transaction) => {
      await saveArray(snapshot.id, `${name}:values`, result.values, transaction);
      await saveArray(snapshot.id, `${name}:residuals`, result.residuals, transaction);
    });
    return {
      laplacian,
      values: [...result.values],
      residuals: [...result.residuals],
      complete: result.complete,
    };
  } finally {
    running--;
  }
}
