import type { Actor } from '@/lib/actor';
import { notFound, unprocessable } from '@/lib/problem';
import { VERSION } from '@/lib/version';
import { Grouping, sequelize, type Job } from '@/server/models';
import { enqueue } from '@/server/queue';
import { snapshotFor } from '@/features/network/index.server';
import { audit } from '@/features/workspaces/index.server';
import type { MakeGrouping } from './groupings';
import { groupsOf } from './scope.server';

const NAMES = { fiedler: 'Split in two', spectral: 'Groups at once', louvain: 'Louvain' } as const;

/** Another group can only be split when it belongs to a finished grouping of the same snapshot. */
async function checkWithin(snapshotId: string, within: MakeGrouping['within']): Promise<string | null> {
  if (!within) return null;
  const parent = await Grouping.findOne({ where: { id: within.grouping, snapshotId, state: 'ready' } });
  const group = parent && groupsOf(parent).find((one) => one.index === within.group);
  if (!group) throw notFound();
  if (group.size < 2)
    throw unprocessable('group-too-small', `Group ${group.letter} has one member and cannot be split.`);
  return `${parent.name}, ${group.name ?? group.letter} split`;
}

/**
 * Writes the grouping and its job together.
 * @throws ProblemError 404 for outsiders, 403 where the role makes no groupings, 422 for what cannot be split.
 */
export async function makeGrouping(
  actor: Actor,
  snapshotId: string,
  input: MakeGrouping,
): Promise<{ grouping: Grouping; job: Job }> {
  const { snapshot } = await snapshotFor(actor, snapshotId, 'analysis.make');
  const fromParent = await checkWithin(snapshot.id, input.within);
  if (snapshot.ties === 0)
    throw unprocessable('no-ties', 'This snapshot has no ties, so there is nothing to divide.');
  const { name, method, laplacian, cut, seed, ...options } = input;
  return sequelize.transaction(async (transaction) => {
    const grouping = await Grouping.create(
      {
        workspaceId: snapshot.workspaceId,
        communityId: snapshot.communityId,
        snapshotId: snapshot.id,
        name: name ?? fromParent ?? NAMES[method],
        method,
        laplacian,
        cut: method === 'fiedler' ? cut : null,
        options: { ...options },
        seed,
        version: VERSION,
        createdBy: actor.userId,
      },
      { transaction },
    );
    await audit(
      {
        workspaceId: snapshot.workspaceId,
        actorId: actor.userId,
        action: 'grouping.make',
        targetKind: 'grouping',
        targetId: grouping.id,
        detail: { snapshotId: snapshot.id, method, laplacian },
      },
      transaction,
    );
    const job = await enqueue(
      {
        kind: 'grouping',
        targetId: grouping.id,
        workspaceId: snapshot.workspaceId,
        createdBy: actor.userId,
      },
      transaction,
    );
    return { grouping, job };
  });
}
