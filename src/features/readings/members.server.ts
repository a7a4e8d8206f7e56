import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { Case, Grouping, sequelize, type Reading } from '@/server/models';
import { memberCode } from '@/features/members/index.server';
import type { Access } from '@/features/workspaces/index.server';
import type { ReadingMembersQuery, ReadingMemberView } from './readings';
import { readingFor } from './scope.server';

/** A member's line as the database has it. */
export interface MemberLine {
  ordinal: number;
  member_id: string;
  external_id: string;
  name: string | null;
  value: number | null;
  smoothed: number | null;
  standard_error: number | null;
  departure: number | null;
  leverage: number | null;
  z: number | null;
  p: number | null;
  q: number | null;
  observed: boolean;
  tested: boolean;
  neighbours: number;
  local_i: number | null;
  local_expectation: number | null;
  local_variance: number | null;
  local_z: number | null;
  local_p: number | null;
  local_q: number | null;
  local_permutation_p: number | null;
  quadrant: 'HH' | 'LL' | 'HL' | 'LH' | null;
  group_index: number | null;
}

const ORDERS = {
  order: 'r.ordinal',
  departure: 'abs(r.departure) DESC NULLS LAST, r.ordinal',
  q: 'r.q ASC NULLS LAST, abs(r.z) DESC NULLS LAST, r.ordinal',
} as const;

const newestGrouping = (snapshotId: string): Promise<Grouping | null> =>
  Grouping.findOne({
    where: { snapshotId, state: 'ready' },
    order: [['createdAt', 'DESC']],
  });

/** One page of lines; the rows of a reading never change, so that a place in the order is a safe cursor. */
export function memberLines(
  reading: Reading,
  groupingId: string | null,
  query: Pick<ReadingMembersQuery, 'sort' | 'maximumQ'>,
  offset: number,
  limit: number,
): Promise<MemberLine[]> {
  return sequelize.query<MemberLine>(
    `SELECT r.*, m.member_id, m.external_id, m.name, g.group_index
     FROM reading_members r
     JOIN snapshot_members m ON m.snapshot_id = $2 AND m.ordinal = r.ordinal
     LEFT JOIN grouping_members g ON g.grouping_id = $3 AND g.ordinal = r.ordinal
     WHERE r.reading_id = $1 AND ($4::float8 IS NULL OR (r.tested AND r.q <= $4))
     ORDER BY ${ORDERS[query.sort]} OFFSET $5 LIMIT $6`,
    {
      bind: [reading.id, reading.snapshotId, groupingId, query.maximumQ ?? null, offset, limit],
      type: QueryTypes.SELECT,
    },
  );
}

const present = (
  actor: Actor,
  access: Access,
  line: MemberLine,
): Omit<ReadingMemberView, 'group' | 'case'> => ({
  id: line.member_id,
  externalId: access.names ? line.external_id : null,
  name: access.names ? (line.name ?? line.external_id) : null,
  code: access.names ? null : memberCode(actor.userId, line.member_id),
  value: line.value,
  smoothed: line.smoothed,
  standardError: line.standard_error,
  departure: line.departure,
  leverage: line.leverage,
  z: line.z,
  p: line.p,
  q: line.q,
  observed: line.observed,
  tested: line.tested,
  neighbours: line.neighbours,
  localMoran: {
    I: line.local_i,
    expectation: line.local_expectation,
    variance: line.local_variance,
    z: line.local_z,
    p: line.local_p,
    q: line.local_q,
    permutationP: line.local_permutation_p,
    quadrant: line.quadrant,
  },
});

/** A page of the members of a reading. @throws ProblemError 404, 403. */
export async function readingMembers(
  actor: Actor,
  id: string,
  query: ReadingMembersQuery,
): Promise<{ items: ReadingMemberView[]; nextCursor: string | null }> {
  const { reading, access } = await readingFor(actor, id, 'explore.open');
  const offset = Math.max(0, Number.parseInt(query.cursor ?? '0', 10) || 0);
  const grouping = await newestGrouping(reading.snapshotId);
  const lines = await memberLines(reading, grouping?.id ?? null, query, offset, query.limit + 1);
  const page = lines.slice(0, query.limit);
  const groups = (grouping?.result as { groups?: { letter: string; name: string | null }[] } | null)?.groups;
  const cases = await Case.findAll({
    where: { readingId: id },
    attributes: ['id', 'memberId', 'state', 'decision'],
  });
  const caseOf = new Map(cases.map((one) => [one.memberId, one]));
  return {
    items: page.map((line) => {
      const group = line.group_index === null ? undefined : groups?.[line.group_index];
      const found = caseOf.get(line.member_id);
      return {
        ...present(actor, access, line),
        group: group ? { letter: group.letter, name: group.name } : null,
        case: found ? { id: found.id, state: found.state, decision: found.decision } : null,
      };
    }),
    nextCursor: lines.length > query.limit ? String(offset + query.limit) : null,
  };
}
