import { ProblemError } from '@/lib/problem';
import { groupLetter } from '@/lib/groups';
import { Grouping, GroupingMember, sequelize } from '@/server/models';
import type { JobHandler } from '@/server/queue';
import { runInThread } from '@/server/threads/run-in-thread';
import { attributesOf, loadAttribute, loadLabels, loadNetwork } from '@/features/network/index.server';
import type { GroupingInput, GroupingOutput } from './compute';
import type { Group, GroupingResult, MakeGrouping } from './groupings';
import { saveMembers } from './insert.server';
import { proposeNames } from './labels';
import { profiles } from './profile';
import { groupsOf } from './scope.server';

async function parentOf(within: MakeGrouping['within'], n: number): Promise<GroupingInput['parent']> {
  if (!within) return null;
  const labels = new Int32Array(n).fill(-1);
  const [parent, rows] = await Promise.all([
    Grouping.findByPk(within.grouping),
    GroupingMember.findAll({ where: { groupingId: within.grouping }, raw: true }),
  ]);
  if (!parent)
    throw new ProblemError(
      404,
      'not-found',
      'The grouping is gone.',
      'The grouping to be split was removed.',
    );
  for (const row of rows) labels[row.ordinal] = row.groupIndex ?? -1;
  const islets = groupsOf(parent)
    .filter((group) => group.islet)
    .map((group) => group.index);
  return { labels, islets, group: within.group };
}

/** Names proposed from the label attributes and profiles over the numeric ones; sensitive attributes are not used. */
async function describe(
  snapshotId: string,
  labels: Int32Array,
  count: number,
): Promise<{ names: (string | null)[]; profile: Group['profile'][] }> {
  const attributes = (await attributesOf(snapshotId)).filter((attribute) => !attribute.sensitive);
  const words = await Promise.all(
    attributes.filter((one) => one.type === 'label').map((one) => loadLabels(one.id, labels.length)),
  );
  const numbers = await Promise.all(
    attributes
      .filter((one) => one.type === 'number')
      .slice(0, 12)
      .map(async (one) => ({ name: one.name, values: await loadAttribute(snapshotId, one.id) })),
  );
  return { names: proposeNames(labels, count, words), profile: profiles(labels, count, numbers) };
}

/**
 * Computes a grouping in a thread and writes its members and its result in one transaction. Running it again
 * replaces what was written before.
 */
export const groupingJob: JobHandler = async ({ targetId, signal, progress }) => {
  const started = Date.now();
  const grouping = await Grouping.findByPk(targetId);
  if (!grouping)
    throw new ProblemError(404, 'not-found', 'The grouping is gone.', 'It was removed before it was made.');
  progress(0.01, 'Loading the network');
  const net = await loadNetwork(grouping.snapshotId);
  const options = grouping.options as Pick<MakeGrouping, 'k' | 'tau' | 'within' | 'minimumSize'>;
  const input: GroupingInput = {
    net,
    method: grouping.method,
    laplacian: grouping.laplacian,
    cut: (grouping.cut ?? 'sweep') as GroupingInput['cut'],
    k: options.k,
    tau: options.tau ?? null,
    minimumSize: options.minimumSize ?? null,
    seed: grouping.seed,
    parent: await parentOf(options.within, net.n),
  };
  const { labels, vector, groups, boundary, ...rest } = await runInThread<GroupingOutput>('grouping', input, {
    signal,
    progress: (done, step) => progress(0.05 + 0.85 * done, step),
  });
  progress(0.92, 'Describing the groups');
  const { names, profile } = await describe(grouping.snapshotId, labels, groups.length);
  const result: GroupingResult & { boundary: typeof boundary } = {
    ...rest,
    groups: groups.map((group, index) => ({
      ...group,
      index,
      letter: groupLetter(index),
      name: names[index] ?? null,
      proposed: Boolean(names[index]),
      profile: profile[index]!,
    })),
    boundary,
    seconds: (Date.now() - started) / 1000,
  };
  progress(0.95, 'Saving');
  await sequelize.transaction(async (transaction) => {
    // Another run of this job waits here, and then replaces the rows instead of colliding with them.
    await grouping.reload({ transaction, lock: transaction.LOCK.UPDATE });
    await saveMembers(targetId, labels, vector, transaction);
    const k = groups.filter((group) => !group.islet).length;
    await grouping.update(
      { result: { ...result }, k, state: 'ready', finishedAt: new Date() },
      { transaction },
    );
    // A stop that arrives while rows are being written still leaves nothing behind.
    signal.throwIfAborted();
  });
  return { kind: 'grouping', id: targetId, href: `/api/v1/groupings/${targetId}` };
};

/** A stopped grouping leaves nothing; a failed one stays in the list with its reason. */
export async function groupingEnded(targetId: string, state: 'failed' | 'cancelled'): Promise<void> {
  if (state === 'cancelled') await Grouping.destroy({ where: { id: targetId, state: 'queued' } });
  else await Grouping.update({ state: 'failed', finishedAt: new Date() }, { where: { id: targetId } });
}
