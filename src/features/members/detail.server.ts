import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { notFound } from '@/lib/problem';
import { sequelize, SnapshotMember } from '@/server/models';
import type { SharedSnapshot } from '@/features/views/index.server';
import type { MemberDetail, MembersQuery } from './members';
import { memberRows } from './rows.server';

const MOST_NEIGHBOURS = 200;

/**
 * One member with the same fields of their neighbours, for the side panel of the Map.
 * @throws ProblemError 404 when the member is not in this snapshot
 */
export async function memberDetail(
  actor: Actor,
  shared: SharedSnapshot,
  memberId: string,
  columns: readonly string[],
): Promise<MemberDetail> {
  const { snapshot } = shared;
  const row = await SnapshotMember.findOne({ where: { snapshotId: snapshot.id, memberId } });
  if (!row) throw notFound();
  const ties = await sequelize.query<{
    member_id: string;
    weight: number;
    kind: string | null;
    count: number;
  }>(
    `SELECT m.member_id, t.weight, t.kind, t.count FROM ties t
     JOIN snapshot_members m ON m.snapshot_id = t.snapshot_id AND m.ordinal = CASE WHEN t.source = $2 THEN t.target ELSE t.source END
     WHERE t.snapshot_id = $1 AND (t.source = $2 OR t.target = $2) ORDER BY t.weight DESC, m.ordinal LIMIT $3`,
    { bind: [snapshot.id, row.ordinal, MOST_NEIGHBOURS], type: QueryTypes.SELECT },
  );
  const ask = (members: string[]): MembersQuery => ({
    filter: [{ kind: 'members', members }],
    columns: [...columns],
    limit: MOST_NEIGHBOURS + 1,
  });
  const own = await memberRows(actor, shared, ask([memberId]));
  if (!own.items[0]) throw notFound();
  const found =
    ties.length > 0 ? (await memberRows(actor, shared, ask(ties.map((tie) => tie.member_id)))).items : [];
  const byId = new Map(found.map((one) => [one.id, one]));
  return {
    member: own.items[0],
    degree: row.degree,
    neighbours: ties.flatMap((tie) => {
      const neighbour = byId.get(tie.member_id);
      return neighbour ? [{ ...neighbour, weight: tie.weight, tieKind: tie.kind, count: tie.count }] : [];
    }),
  };
}
