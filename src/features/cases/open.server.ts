import { Op, QueryTypes } from 'sequelize';
import type * as z from 'zod';
import type { Actor } from '@/lib/actor';
import { unprocessable } from '@/lib/problem';
import {
  Attribute,
  Case,
  CaseEvent,
  ReadingMember,
  sequelize,
  SnapshotMember,
  type Reading,
} from '@/server/models';
import { audit } from '@/features/workspaces/index.server';
import type { CasesPreview, CaseView, Evidence, openCasesSchema } from './cases';
import { presentCases } from './present.server';
import { expectedFalse } from './rules';
import { readingForCases } from './scope.server';

/** Most cases opened in one go: a queue nobody can read is not a review. */
const MOST = 1_000;

interface Candidate {
  readonly row: ReadingMember;
  readonly memberId: string;
}

/** Members past the threshold; those below the neighbour floor were never tested and cannot be among them. */
async function candidates(
  reading: Reading,
  threshold: number,
  members?: readonly string[],
): Promise<Candidate[]> {
  const rows = await ReadingMember.findAll({
    where: { readingId: reading.id, tested: true, q: { [Op.lte]: threshold } },
    order: [
      ['q', 'ASC'],
      ['ordinal', 'ASC'],
    ],
  });
  const found = await SnapshotMember.findAll({
    where: { snapshotId: reading.snapshotId, ordinal: rows.map((row) => row.ordinal) },
    attributes: ['ordinal', 'memberId'],
  });
  const idOf = new Map(found.map((member) => [member.ordinal, member.memberId]));
  const only = members ? new Set(members) : null;
  return rows
    .map((row) => ({ row, memberId: idOf.get(row.ordinal)! }))
    .filter((one) => !only || only.has(one.memberId));
}

/** Members who already have an undecided case about the same attribute. */
async function alreadyOpen(reading: Reading, ids: readonly string[]): Promise<Set<string>> {
  const rows = await Case.findAll({
    where: {
      communityId: reading.communityId,
      memberId: [...ids],
      [Op.or]: [{ state: ['open', 'watching'] }, { readingId: reading.id }],
    },
    attributes: ['memberId', 'evidence'],
  });
  const same = rows.filter((row) => (row.evidence as unknown as Evidence).attribute === reading.attribute);
  return new Set(same.map((row) => row.memberId));
}

const evidenceOf = ({ row }: Candidate, attribute: string, threshold: number): Evidence => ({
  attribute,
  value: row.value,
  predicted: row.value === null || row.departure === null ? null : row.value - row.departure,
  departure: row.departure,
  z: row.z,
  p: row.p,
  q: row.q,
  neighbours: row.neighbours,
  localMoran: { z: row.localZ, q: row.localQ, quadrant: row.quadrant },
  threshold,
});

/**
 * Opens a case for every member of a reading past the threshold who has none yet, or only says how many that
 * would be and how many of them are likely to be false flags.
 * @throws ProblemError 422 for sensitive attributes, which cannot be used for cases
 */
export async function openCases(
  actor: Actor,
  readingId: string,
  input: z.output<typeof openCasesSchema>,
): Promise<CasesPreview | { items: CaseView[] }> {
  const { reading, access } = await readingForCases(actor, readingId);
  const attribute = await Attribute.findByPk(reading.attributeId);
  if (attribute?.sensitive)
    throw unprocessable(
      'sensitive-attribute',
      `${reading.attribute} is marked as sensitive. Sensitive attributes are not used for cases.`,
    );
  const past = await candidates(reading, input.threshold, input.members);
  const open = await alreadyOpen(
    reading,
    past.map((one) => one.memberId),
  );
  const fresh = past.filter((one) => !open.has(one.memberId));
  if (input.preview) {
    const [noScore, observed, tested] = await Promise.all([
      ReadingMember.count({ where: { readingId: reading.id, observed: false } }),
      ReadingMember.count({ where: { readingId: reading.id, observed: true } }),
      ReadingMember.count({ where: { readingId: reading.id, tested: true } }),
    ]);
    return {
      preview: true,
      threshold: input.threshold,
      count: fresh.length,
      expectedFalse: expectedFalse(past.length, input.threshold),
      alreadyOpen: past.length - fresh.length,
      leftOut: { tooFewNeighbours: observed - tested, noScore },
    };
  }
  if (fresh.length > MOST)
    throw unprocessable(
      'too-many-cases',
      `This would open ${fresh.length} cases; ${MOST} is the most at once. Use a lower threshold.`,
    );
  const items = await sequelize.transaction(async (transaction) => {
    // One numbering at a time in a workspace; a second request waits here and then finds nothing left to open.
    await sequelize.query('SELECT pg_advisory_xact_lock(hashtext($1))', {
      bind: [reading.workspaceId],
      type: QueryTypes.SELECT,
      transaction,
    });
    const taken = await alreadyOpen(
      reading,
      fresh.map((one) => one.memberId),
    );
    const left = fresh.filter((one) => !taken.has(one.memberId));
    const last = (await Case.max('number', { where: { workspaceId: reading.workspaceId }, transaction })) as
      number | null;
    const rows = await Case.bulkCreate(
      left.map((one, index) => ({
        number: (last ?? 0) + index + 1,
        workspaceId: reading.workspaceId,
        communityId: reading.communityId,
        snapshotId: reading.snapshotId,
        readingId: reading.id,
        memberId: one.memberId,
        ordinal: one.row.ordinal,
        evidence: { ...evidenceOf(one, reading.attribute, input.threshold) },
        openedBy: actor.userId,
      })),
      { transaction },
    );
    await CaseEvent.bulkCreate(
      rows.map((row) => ({
        caseId: row.id,
        workspaceId: row.workspaceId,
        actorId: actor.userId,
        kind: 'opened',
        body: { readingId: reading.id, threshold: input.threshold },
      })),
      { transaction },
    );
    await audit(
      {
        workspaceId: reading.workspaceId,
        actorId: actor.userId,
        action: 'cases.open',
        targetKind: 'reading',
        targetId: reading.id,
        detail: { count: rows.length, threshold: input.threshold },
      },
      transaction,
    );
    return rows;
  });
  return {
    items: await presentCases(
      actor,
      access,
      await Case.findAll({ where: { id: items.map((row) => row.id) }, order: [['number', 'ASC']] }),
    ),
  };
}
