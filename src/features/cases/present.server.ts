import type { Actor } from '@/lib/actor';
import { SnapshotMember, User, type Case } from '@/server/models';
import { memberCode } from '@/features/members/index.server';
import type { Access } from '@/features/workspaces/index.server';
import type { CaseView, Decision, Evidence } from './cases';

export async function peopleByIds(
  ids: readonly (string | null)[],
): Promise<Map<string, { id: string; name: string }>> {
  const wanted = [...new Set(ids.filter((id) => id !== null))];
  const users = await User.findAll({ where: { id: wanted }, attributes: ['id', 'name'] });
  return new Map(users.map(({ id, name }) => [id, { id, name }]));
}

/** A member as a case names them; names only for roles that may see them. */
export const presentMember = (
  actor: Actor,
  access: Access,
  member: { memberId: string; externalId: string; name: string | null },
): CaseView['member'] => ({
  id: member.memberId,
  externalId: access.names ? member.externalId : null,
  name: access.names ? (member.name ?? member.externalId) : null,
  code: access.names ? null : memberCode(actor.userId, member.memberId),
});

/** Field whitelist of cases, in the order given. */
export async function presentCases(actor: Actor, access: Access, rows: readonly Case[]): Promise<CaseView[]> {
  const people = await peopleByIds(rows.flatMap((row) => [row.assigneeId, row.escalationBy]));
  const members = await SnapshotMember.findAll({
    where: {
      snapshotId: [...new Set(rows.map((row) => row.snapshotId))],
      memberId: rows.map((row) => row.memberId),
    },
  });
  const memberOf = new Map(members.map((member) => [`${member.snapshotId}|${member.memberId}`, member]));
  return rows.map((row) => {
    const evidence = row.evidence as unknown as Evidence;
    return {
      id: row.id,
      number: row.number,
      state: row.state as CaseView['state'],
      member: presentMember(actor, access, memberOf.get(`${row.snapshotId}|${row.memberId}`)!),
      communityId: row.communityId,
      snapshotId: row.snapshotId,
      readingId: row.readingId,
      attribute: evidence.attribute,
      departure: evidence.departure,
      q: evidence.q,
      assignee: row.assigneeId ? (people.get(row.assigneeId) ?? null) : null,
      priority: row.priority as CaseView['priority'],
      dueOn: row.dueOn,
      decision: row.decision as Decision | null,
      reason: row.reason,
      escalationBy: row.escalationBy ? (people.get(row.escalationBy) ?? null) : null,
      version: row.version,
      createdAt: row.createdAt.toISOString(),
      href: `/w/${row.workspaceId}/c/${row.communityId}/cases/${row.id}`,
    };
  });
}
