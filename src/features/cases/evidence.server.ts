import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { Reading, sequelize, type Case } from '@/server/models';
import type { Access } from '@/features/workspaces/index.server';
import type { CaseDetail } from './cases';
import { presentMember } from './present.server';

const MOST_NEIGHBOURS = 150;

/** Scores of the tied members in the reading of the case, strongest tie first, and the ties among them. */
export async function neighbourhoodOf(
  actor: Actor,
  access: Access,
  row: Case,
): Promise<CaseDetail['neighbourhood']> {
  const reading = await Reading.findByPk(row.readingId, { attributes: ['result'] });
  const sigma = (reading?.result as { sigma?: number } | null)?.sigma ?? null;
  const found = await sequelize.query<{
    ordinal: number;
    member_id: string;
    external_id: string;
    name: string | null;
    value: number | null;
    smoothed: number | null;
    weight: number;
  }>(
    `SELECT m.ordinal, m.member_id, m.external_id, m.name, r.value, r.smoothed, t.weight
     FROM ties t
     JOIN snapshot_members m ON m.snapshot_id = t.snapshot_id AND m.ordinal = CASE WHEN t.source = $2 THEN t.target ELSE t.source END
     LEFT JOIN reading_members r ON r.reading_id = $3 AND r.ordinal = m.ordinal
     WHERE t.snapshot_id = $1 AND (t.source = $2 OR t.target = $2)
     ORDER BY t.weight DESC, m.ordinal LIMIT $4`,
    { bind: [row.snapshotId, row.ordinal, row.readingId, MOST_NEIGHBOURS], type: QueryTypes.SELECT },
  );
  const place = new Map(found.map((one, index) => [one.ordinal, index]));
  const ties = await sequelize.query<{ source: number; target: number }>(
    'SELECT source, target FROM ties WHERE snapshot_id = $1 AND source = ANY($2::int[]) AND target = ANY($2::int[])',
    { bind: [row.snapshotId, [...place.keys()]], type: QueryTypes.SELECT },
  );
  return {
    sigma,
    items: found.map((one) => ({
      ...presentMember(actor, access, {
        memberId: one.member_id,
        externalId: one.external_id,
        name: one.name,
      }),
      value: one.value,
      smoothed: one.smoothed,
      weight: one.weight,
      ordinal: one.ordinal,
    })),
    between: ties.map((tie) => [place.get(tie.source)!, place.get(tie.target)!]),
  };
}

/** The member's score over the snapshots, with what the neighbourhood predicted where a reading exists. */
export async function historyOf(row: Case, attribute: string): Promise<CaseDetail['history']> {
  const rows = await sequelize.query<{
    snapshot_id: string;
    taken_on: string;
    value: number | null;
    departure: number | null;
    standard_error: number | null;
    sigma: number | null;
  }>(
    `SELECT s.id AS snapshot_id, s.taken_on::text, v.value, r.departure, r.standard_error, r.sigma
     FROM snapshots s
     JOIN snapshot_members m ON m.snapshot_id = s.id AND m.member_id = $2
     JOIN attributes a ON a.snapshot_id = s.id AND a.name = $3
     LEFT JOIN attribute_values v ON v.attribute_id = a.id AND v.ordinal = m.ordinal
     LEFT JOIN LATERAL (
       SELECT rm.departure, rm.standard_error, (rd.result->>'sigma')::float8 AS sigma FROM readings rd
       JOIN reading_members rm ON rm.reading_id = rd.id AND rm.ordinal = m.ordinal
       WHERE rd.attribute_id = a.id AND rd.state = 'ready'
       ORDER BY (rd.id = $4) DESC, rd.created_at DESC LIMIT 1) r ON true
     WHERE s.community_id = $1 AND s.state = 'ready' ORDER BY s.taken_on, s.created_at`,
    { bind: [row.communityId, row.memberId, attribute, row.readingId], type: QueryTypes.SELECT },
  );
  return rows.map((one) => {
    const known = one.value !== null && one.departure !== null;
    return {
      snapshotId: one.snapshot_id,
      takenOn: one.taken_on,
      value: one.value,
      predicted: known ? one.value! - one.departure! : null,
      // 95 % of such members fall within this of the prediction, were nothing their own going on.
      half: known && one.sigma !== null ? 1.96 * Math.hypot(one.sigma, one.standard_error ?? 0) : null,
    };
  });
}

/** The member's other attributes in the same snapshot, with a departure where a reading was taken. */
export async function othersOf(row: Case, attribute: string): Promise<CaseDetail['others']> {
  const rows = await sequelize.query<{
    name: string;
    value: number | null;
    departure: number | null;
    reading_id: string | null;
  }>(
    `SELECT a.name, v.value, r.departure, r.reading_id
     FROM attributes a
     LEFT JOIN attribute_values v ON v.attribute_id = a.id AND v.ordinal = $2
     LEFT JOIN LATERAL (
       SELECT rm.departure, rd.id AS reading_id FROM readings rd
       JOIN reading_members rm ON rm.reading_id = rd.id AND rm.ordinal = $2
       WHERE rd.attribute_id = a.id AND rd.state = 'ready' ORDER BY rd.created_at DESC LIMIT 1) r ON true
     WHERE a.snapshot_id = $1 AND a.type = 'number' AND NOT a.sensitive AND a.name <> $3 ORDER BY a.ordinal`,
    { bind: [row.snapshotId, row.ordinal, attribute], type: QueryTypes.SELECT },
  );
  return rows.map((one) => ({
    attribute: one.name,
    value: one.value,
    departure: one.departure,
    readingId: one.reading_id,
  }));
}
