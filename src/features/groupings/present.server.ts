import type { Actor } from '@/lib/actor';
import { Job, SnapshotMember, User, type Grouping } from '@/server/models';
import { memberCode } from '@/features/members/index.server';
import type { Access } from '@/features/workspaces/index.server';
import type { Boundary, GroupingResult, GroupingSummary, GroupingView } from './groupings';
import { groupsOf, resultOf, type OpenGrouping } from './scope.server';

export const hrefOf = (grouping: Grouping): string =>
  `/w/${grouping.workspaceId}/c/${grouping.communityId}/groups/${grouping.id}?snapshot=${grouping.snapshotId}`;

/** A member as others refer to them; names and uploaded ids only for those who may see them. */
export const presentMember = (
  actor: Actor,
  access: Access,
  member: { memberId: string; externalId: string; name: string | null },
): { id: string; externalId: string | null; name: string | null; code: string | null } => ({
  id: member.memberId,
  externalId: access.names ? member.externalId : null,
  name: access.names ? (member.name ?? member.externalId) : null,
  code: access.names ? null : memberCode(actor.userId, member.memberId),
});

async function namesOf(rows: readonly Grouping[]): Promise<Map<string, string>> {
  const ids = [...new Set(rows.flatMap((row) => row.createdBy ?? []))];
  const users = await User.findAll({ where: { id: ids }, attributes: ['id', 'name'] });
  return new Map(users.map(({ id, name }) => [id, name]));
}

async function jobsOf(rows: readonly Grouping[]): Promise<Map<string, string>> {
  const unfinished = rows.filter((row) => row.state !== 'ready').map((row) => row.id);
  const jobs = await Job.findAll({ where: { kind: 'grouping', targetId: unfinished } });
  return new Map(jobs.map((job) => [job.targetId, job.id]));
}

/** What an unfinished or failed grouping answers with in place of numbers. */
const EMPTY: GroupingResult = {
  eigenvalues: [],
  residuals: [],
  gaps: null,
  modularity: null,
  normalisedCut: null,
  cheeger: null,
  tau: null,
  groups: [],
  scope: { members: 0, component: null },
  between: { weights: [], perThousand: [] },
  seconds: 0,
  source: '',
  notes: [],
};

/** Field whitelist of one grouping, with small groups left out where they are masked. */
export async function presentGrouping(
  actor: Actor,
  { grouping, access, masked }: OpenGrouping,
): Promise<GroupingView> {
  const { boundary: stored, ...result }: GroupingResult & { boundary?: Boundary[] } = {
    ...EMPTY,
    ...resultOf(grouping),
  };
  const boundary = (stored ?? []).filter((one) => !masked.has(one.group) && !masked.has(one.other));
  const members = await SnapshotMember.findAll({
    where: { snapshotId: grouping.snapshotId, ordinal: boundary.map((one) => one.ordinal) },
  });
  const memberOf = new Map(members.map((member) => [member.ordinal, member]));
  const hide = (row: (number | null)[], a: number): (number | null)[] =>
    row.map((value, b) => (masked.has(a) || masked.has(b) ? null : value));
  return {
    ...result,
    groups: result.groups.filter((group) => !masked.has(group.index)),
    between: {
      weights: masked.size ? [] : result.between.weights,
      perThousand: result.between.perThousand.map(hide),
    },
    id: grouping.id,
    communityId: grouping.communityId,
    snapshotId: grouping.snapshotId,
    name: grouping.name,
    state: grouping.state as GroupingView['state'],
    method: grouping.method,
    laplacian: grouping.laplacian,
    cut: grouping.cut as GroupingView['cut'],
    k: grouping.k,
    seed: grouping.seed,
    options: grouping.options,
    boundary: boundary.map(({ ordinal, ...rest }) => ({
      ...rest,
      ...presentMember(actor, access, memberOf.get(ordinal)!),
    })),
    version: grouping.version,
    createdAt: grouping.createdAt.toISOString(),
    createdBy: (await namesOf([grouping])).get(grouping.createdBy ?? '') ?? null,
    finishedAt: grouping.finishedAt?.toISOString() ?? null,
    href: hrefOf(grouping),
    job: (await jobsOf([grouping])).get(grouping.id) ?? null,
  };
}

/** Lines of the list of groupings, in the order given. */
export async function presentSummaries(rows: readonly Grouping[]): Promise<GroupingSummary[]> {
  const [names, jobOf] = await Promise.all([namesOf(rows), jobsOf(rows)]);
  return rows.map((row) => ({
    id: row.id,
    name: row.name,
    state: row.state as GroupingSummary['state'],
    method: row.method,
    laplacian: row.laplacian,
    cut: row.cut as GroupingSummary['cut'],
    k: row.k,
    seed: row.seed,
    modularity: resultOf(row)?.modularity ?? null,
    createdAt: row.createdAt.toISOString(),
    createdBy: names.get(row.createdBy ?? '') ?? null,
    groups: groupsOf(row).map(({ index, letter, name, size, islet }) => ({
      index,
      letter,
      name,
      size,
      islet,
    })),
    href: hrefOf(row),
    job: jobOf.get(row.id) ?? null,
  }));
}
