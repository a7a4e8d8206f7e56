import { Op, QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { groupLetter } from '@/lib/groups';
import { notFound } from '@/lib/problem';
import { agreement } from '@/numerics';
import { Attribute, Grouping, sequelize } from '@/server/models';
import { snapshotFor } from '@/features/network/index.server';
import { audit } from '@/features/workspaces/index.server';
import type {
  ChangeGrouping,
  Comparison,
  GroupingMemberView,
  GroupingSummary,
  GroupingView,
} from './groupings';
import { presentGrouping, presentMember, presentSummaries } from './present.server';
import { groupingFor, groupingThroughView, groupsOf } from './scope.server';

/** Groupings of a snapshot, newest first. @throws ProblemError 404, 403. */
export async function listGroupings(
  actor: Actor,
  snapshotId: string,
): Promise<{ items: GroupingSummary[]; nextCursor: null }> {
  const { snapshot } = await snapshotFor(actor, snapshotId, 'explore.open');
  const rows = await Grouping.findAll({
    where: { snapshotId: snapshot.id },
    order: [['createdAt', 'DESC']],
    limit: 200,
  });
  return { items: await presentSummaries(rows), nextCursor: null };
}

export const getGrouping = async (
  actor: Actor,
  id: string,
  view: string | undefined,
): Promise<GroupingView> => presentGrouping(actor, await groupingThroughView(actor, id, view));

/** Names a grouping or its groups; nothing that was computed changes. @throws ProblemError 404, 403. */
export async function changeGrouping(
  actor: Actor,
  id: string,
  change: ChangeGrouping,
): Promise<GroupingView> {
  await groupingFor(actor, id, 'analysis.make');
  await sequelize.transaction(async (transaction) => {
    const grouping = await Grouping.findByPk(id, { transaction, lock: true });
    if (!grouping || grouping.state !== 'ready') throw notFound();
    const named = new Map(change.groups?.map((one) => [one.index, one.name]));
    const groups = groupsOf(grouping).map((group) =>
      named.has(group.index) ? { ...group, name: named.get(group.index) || null, proposed: false } : group,
    );
    await grouping.update(
      { name: change.name ?? grouping.name, result: { ...grouping.result, groups } },
      { transaction },
    );
    await audit(
      {
        workspaceId: grouping.workspaceId,
        actorId: actor.userId,
        action: 'grouping.change',
        targetKind: 'grouping',
        targetId: id,
        detail: { name: change.name !== undefined, groups: named.size },
      },
      transaction,
    );
  });
  return presentGrouping(actor, await groupingFor(actor, id, 'analysis.make'));
}

/** Group and vector entry of each member, in member order. */
export async function groupingMembers(
  actor: Actor,
  id: string,
  query: {
    limit: number;
    cursor?: string | undefined;
    group?: number | undefined;
    view?: string | undefined;
  },
): Promise<{ items: GroupingMemberView[]; nextCursor: string | null }> {
  const { grouping, access, masked } = await groupingThroughView(actor, id, query.view);
  const after = query.cursor === undefined ? -1 : Number.parseInt(query.cursor, 10);
  if (query.group !== undefined && masked.has(query.group)) return { items: [], nextCursor: null };
  const rows = await sequelize.query<{
    ordinal: number;
    group_index: number | null;
    vector: number | null;
    member_id: string;
    external_id: string;
    name: string | null;
  }>(
    `SELECT g.ordinal, g.group_index, g.vector, m.member_id, m.external_id, m.name
     FROM grouping_members g JOIN snapshot_members m ON m.snapshot_id = $2 AND m.ordinal = g.ordinal
     WHERE g.grouping_id = $1 AND g.ordinal > $3 AND ($4::int IS NULL OR g.group_index = $4)
     ORDER BY g.ordinal LIMIT $5`,
    {
      bind: [id, grouping.snapshotId, Number.isNaN(after) ? -1 : after, query.group ?? null, query.limit + 1],
      type: QueryTypes.SELECT,
    },
  );
  const page = rows.slice(0, query.limit);
  return {
    items: page.map((row) => ({
      ...presentMember(actor, access, {
        memberId: row.member_id,
        externalId: row.external_id,
        name: row.name,
      }),
      group: row.group_index === null || masked.has(row.group_index) ? null : row.group_index,
      vector: masked.size > 0 ? null : row.vector,
    })),
    nextCursor: rows.length > query.limit ? String(page.at(-1)!.ordinal) : null,
  };
}

interface Pair {
  a: number;
  b: number | string;
}

/** Both labels of each member who has one in each; members are matched across snapshots by their id. */
function pairsWith(
  grouping: Grouping,
  other: { snapshotId: string; id: string; kind: 'grouping' | 'attribute' },
): Promise<Pair[]> {
  const [table, key, value] =
    other.kind === 'grouping'
      ? ['grouping_members', 'grouping_id', 'group_index']
      : ['attribute_values', 'attribute_id', 'label'];
  return sequelize.query<Pair>(
    `SELECT g.group_index AS a, o.${value} AS b
     FROM grouping_members g
     JOIN snapshot_members m ON m.snapshot_id = $2 AND m.ordinal = g.ordinal
     JOIN snapshot_members n ON n.snapshot_id = $4 AND n.member_id = m.member_id
     JOIN ${table} o ON o.${key} = $3 AND o.ordinal = n.ordinal
     WHERE g.grouping_id = $1 AND g.group_index IS NOT NULL AND o.${value} IS NOT NULL
     ORDER BY g.ordinal`,
    { bind: [grouping.id, grouping.snapshotId, other.id, other.snapshotId], type: QueryTypes.SELECT },
  );
}

/** Letters of all groups, those without a member in both included. */
const lettersOf = (grouping: Grouping, labels: Int32Array): string[] => {
  const count = labels.reduce((most, label) => Math.max(most, label + 1), groupsOf(grouping).length);
  return Array.from({ length: count }, (_, index) => groupLetter(index));
};

/** Agreement of a grouping with another one of the same community, or with a label attribute. */
export async function compareGrouping(actor: Actor, id: string, withId: string): Promise<Comparison> {
  const { grouping } = await groupingFor(actor, id, 'explore.open');
  const same = { workspaceId: grouping.workspaceId, communityId: grouping.communityId };
  const other = await Grouping.findOne({ where: { id: withId, ...same, state: 'ready' } });
  const attribute = other
    ? null
    : await Attribute.findOne({
        where: { id: withId, type: 'label', snapshotId: { [Op.eq]: grouping.snapshotId } },
      });
  if (grouping.state !== 'ready' || (!other && !attribute)) throw notFound();
  const pairs = await pairsWith(
    grouping,
    other
      ? { snapshotId: other.snapshotId, id: other.id, kind: 'grouping' }
      : { snapshotId: grouping.snapshotId, id: attribute!.id, kind: 'attribute' },
  );
  const words = other ? [] : [...new Set(pairs.map((pair) => String(pair.b)))].sort();
  const place = new Map(words.map((word, index) => [word, index]));
  const a = Int32Array.from(pairs, (pair) => pair.a);
  const b = Int32Array.from(pairs, (pair) => (other ? (pair.b as number) : place.get(String(pair.b))!));
  const rows = lettersOf(grouping, a);
  const columns = other ? lettersOf(other, b) : words;
  const counts = rows.map(() => new Array<number>(columns.length).fill(0));
  a.forEach((row, index) => {
    counts[row]![b[index]!]! += 1;
  });
  const scores =
    pairs.length > 0 ? agreement(a, b) : { adjustedRand: null, normalisedMutualInformation: null };
  return {
    adjustedRand: scores.adjustedRand,
    normalisedMutualInformation: scores.normalisedMutualInformation,
    members: pairs.length,
    table: { rows, columns, counts },
  };
}
