import { SnapshotArray, sequelize } from '@/server/models';
import { runInThread } from '@/server/threads/run-in-thread';
import { loadArray, saveArray } from '@/features/network/index.server';
import type { Network } from '@/numerics/types';

/** Seed of the groups that the default smoother uses: one set of groups a snapshot, whoever reads it. */
const SEED = 1;

/**
 * Groups for the levels of the default smoother: spectral groups of the whole snapshot, computed once and kept
 * with it. All zeros where the network has no groups to speak of.
 * @param k number of groups, or null for the number at the largest gap
 */
export async function smootherGroups(
  snapshotId: string,
  net: Network,
  k: number | null,
  watch: { signal: AbortSignal; progress: (done: number, step: string) => void },
): Promise<Int32Array> {
  const name = k === null ? 'smoother-groups' : `smoother-groups:${k}`;
  if ((await SnapshotArray.count({ where: { snapshotId, name } })) > 0)
    return (await loadArray(snapshotId, name)) as Int32Array;
  const labels = await runInThread<Int32Array>('smoother-groups', { net, k, seed: SEED }, watch);
  await sequelize.transaction((transaction) => saveArray(snapshotId, name, labels, transaction));
  return labels;
}
