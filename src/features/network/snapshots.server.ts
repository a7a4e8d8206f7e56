import type { Actor } from '@/lib/actor';
import { Attribute, Community, sequelize, Snapshot } from '@/server/models';
import { audit, authorise } from '@/features/workspaces/index.server';
import type { CommunityView, SnapshotView } from './network';
import { communityFor } from './scope.server';

const presentCommunity = async (row: Community): Promise<CommunityView> => ({
  id: row.id,
  name: row.name,
  createdAt: row.createdAt.toISOString(),
  snapshots: await Snapshot.count({ where: { communityId: row.id, state: 'ready' } }),
});

export async function listCommunities(actor: Actor, workspaceId: string): Promise<CommunityView[]> {
  await authorise(actor, workspaceId, 'brief.open');
  const rows = await Community.findAll({ where: { workspaceId }, order: [['createdAt', 'ASC']] });
  return Promise.all(rows.map(presentCommunity));
}

export async function createCommunity(
  actor: Actor,
  workspaceId: string,
  name: string,
): Promise<CommunityView> {
  await authorise(actor, workspaceId, 'analysis.make');
  const row = await sequelize.transaction(async (transaction) => {
    const made = await Community.create({ workspaceId, name, createdBy: actor.userId }, { transaction });
    await audit(
      {
        workspaceId,
        actorId: actor.userId,
        action: 'community.create',
        targetKind: 'community',
        targetId: made.id,
      },
      transaction,
    );
    return made;
  });
  return presentCommunity(row);
}

/** Field whitelist of a snapshot. @param allowed attribute ids that a shared view lets through, or null for all */
export async function presentSnapshot(
  row: Snapshot,
  allowed: ReadonlySet<string> | null = null,
): Promise<SnapshotView> {
  const attributes = await Attribute.findAll({ where: { snapshotId: row.id }, order: [['ordinal', 'ASC']] });
  return {
    id: row.id,
    communityId: row.communityId,
    takenOn: row.takenOn,
    label: row.label,
    members: row.members,
    ties: row.ties,
    totalWeight: row.totalWeight,
    components: row.components,
    largestComponent: row.largestComponent,
    isolated: row.isolated,
    attributes: attributes
      .filter((one) => !allowed || allowed.has(`attribute:${one.id}`))
      .map((one) => ({
        id: one.id,
        name: one.name,
        type: one.type as 'number' | 'label',
        direction: one.direction as 'higher-better' | 'higher-worse' | 'neither',
        sensitive: one.sensitive,
        observed: one.observed,
        summary: one.summary,
      })),
    createdAt: row.createdAt.toISOString(),
  };
}

export async function listSnapshots(actor: Actor, communityId: string): Promise<SnapshotView[]> {
  await communityFor(actor, communityId, 'explore.open');
  const rows = await Snapshot.findAll({
    where: { communityId, state: 'ready' },
    order: [
      ['takenOn', 'DESC'],
      ['createdAt', 'DESC'],
    ],
  });
  return Promise.all(rows.map((row) => presentSnapshot(row)));
}
