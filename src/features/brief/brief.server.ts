import { Op, QueryTypes } from 'sequelize';
import {
  Attribute,
  Case,
  Grouping,
  Import,
  Reading,
  ReadingMember,
  sequelize,
  Snapshot,
} from '@/server/models';
import type { Access } from '@/features/workspaces/index.server';
import type { BriefFacts } from './sentences';

export interface BriefAttribute {
  readonly id: string;
  readonly name: string;
  readonly observed: number;
  readonly mean: number | null;
  readonly counts: readonly number[];
  /** Share that neighbours predict, and members who stand apart; null without a reading, or too few for the role. */
  readonly explained: number | null;
  readonly apart: number | null;
  readonly readingId: string | null;
  /** Means over the snapshots, oldest first. */
  readonly trend: readonly (number | null)[];
}

export interface BriefData {
  readonly facts: BriefFacts;
  readonly attributes: readonly BriefAttribute[];
  readonly picture: readonly { x: number; y: number; group: number | null }[];
  readonly groups: readonly { letter: string; name: string | null; size: number; leaving: number }[];
  readonly openCases: number;
  readonly unassigned: number;
  readonly heldBack: number;
  readonly before: { takenOn: string; members: number; ties: number; came: number; left: number } | null;
}

const DOTS = 1_500;
const THRESHOLD = 0.1;

interface GroupResult {
  index: number;
  letter: string;
  name: string | null;
  size: number;
  cut: number;
  volume: number;
  islet: boolean;
}

async function attributesOf(snapshot: Snapshot): Promise<BriefAttribute[]> {
  const rows = await Attribute.findAll({
    where: { snapshotId: snapshot.id, type: 'number' },
    order: [['ordinal', 'ASC']],
  });
  const snapshots = await Snapshot.findAll({
    where: { communityId: snapshot.communityId, state: 'ready', takenOn: { [Op.lte]: snapshot.takenOn } },
    order: [['takenOn', 'ASC']],
  });
  const history = await Attribute.findAll({
    where: { snapshotId: snapshots.map((one) => one.id), name: rows.map((row) => row.name) },
  });
  return Promise.all(
    rows.map(async (row) => {
      const summary = row.summary as { mean?: number; histogram?: { counts: number[] } };
      const reading = await Reading.findOne({
        where: { attributeId: row.id, state: 'ready' },
        order: [['createdAt', 'DESC']],
      });
      const meanIn = (snapshotId: string): number | null => {
        const one = history.find((other) => other.snapshotId === snapshotId && other.name === row.name);
        return (one?.summary as { mean?: number } | undefined)?.mean ?? null;
      };
      return {
        id: row.id,
        name: row.name,
        observed: row.observed,
        mean: summary.mean ?? null,
        counts: summary.histogram?.counts ?? [],
        explained: (reading?.result as { explained?: number | null } | null)?.explained ?? null,
        apart: reading
          ? await ReadingMember.count({
              where: { readingId: reading.id, tested: true, q: { [Op.lte]: THRESHOLD } },
            })
          : null,
        readingId: reading?.id ?? null,
        trend: snapshots.map((one) => meanIn(one.id)),
      };
    }),
  );
}

async function pictureOf(snapshot: Snapshot, grouping: Grouping | null): Promise<BriefData['picture']> {
  return sequelize.query<{ x: number; y: number; group: number | null }>(
    `SELECT m.x, m.y, g.group_index AS "group" FROM snapshot_members m
     LEFT JOIN grouping_members g ON g.grouping_id = $2 AND g.ordinal = m.ordinal
     WHERE m.snapshot_id = $1 AND m.ordinal % $3 = 0 ORDER BY m.ordinal LIMIT $4`,
    {
      bind: [snapshot.id, grouping?.id ?? null, Math.max(1, Math.ceil(snapshot.members / DOTS)), DOTS],
      type: QueryTypes.SELECT,
    },
  );
}

async function beforeOf(snapshot: Snapshot): Promise<BriefData['before']> {
  const before = await Snapshot.findOne({
    where: { communityId: snapshot.communityId, state: 'ready', takenOn: { [Op.lt]: snapshot.takenOn } },
    order: [['takenOn', 'DESC']],
  });
  if (!before) return null;
  const [found] = await sequelize.query<{ shared: number }>(
    `SELECT count(*)::int AS shared FROM snapshot_members a JOIN snapshot_members b ON b.member_id = a.member_id
     WHERE a.snapshot_id = $1 AND b.snapshot_id = $2`,
    { bind: [snapshot.id, before.id], type: QueryTypes.SELECT },
  );
  const shared = found?.shared ?? 0;
  return {
    takenOn: before.takenOn,
    members: before.members,
    ties: before.ties,
    came: snapshot.members - shared,
    left: before.members - shared,
  };
}

/** What the front page says of a snapshot; groups too small to show stay out of it for viewers. */
export async function briefOf(snapshot: Snapshot, access: Access): Promise<BriefData> {
  const grouping = await Grouping.findOne({
    where: { snapshotId: snapshot.id, state: 'ready' },
    order: [['createdAt', 'DESC']],
  });
  const all = ((grouping?.result as { groups?: GroupResult[] } | null)?.groups ?? []).filter(
    (one) => !one.islet,
  );
  const free = access.can('explore.open');
  const least = access.workspace.smallestGroup;
  const large = (count: number | null): boolean => free || (count ?? 0) >= least;
  const shown = all.filter((one) => large(one.size));
  const shownIndices = new Set(shown.map((one) => one.index));
  const groups = shown.map(({ letter, name, size, cut, volume }) => ({
    letter,
    name,
    size,
    leaving: volume > 0 ? cut / volume : 0,
  }));
  const [attributes, picture, before, openCases, unassigned, lastImport] = await Promise.all([
    attributesOf(snapshot),
    pictureOf(snapshot, grouping),
    beforeOf(snapshot),
    Case.count({ where: { communityId: snapshot.communityId, state: 'open' } }),
    Case.count({ where: { communityId: snapshot.communityId, state: 'open', assigneeId: null } }),
    snapshot.importId ? Import.findByPk(snapshot.importId) : null,
  ]);
  const weakest = [...groups].sort((a, b) => a.leaving - b.leaving)[0];
  // For viewers a count of a few people is as telling as their names.
  const masked = attributes.map((one) => ({
    ...one,
    ...(large(one.observed) ? {} : { mean: null, counts: [], trend: [] }),
    ...(large(one.apart) ? {} : { apart: null, readingId: null }),
  }));
  const read = masked.filter((one) => one.explained !== null).sort((a, b) => b.explained! - a.explained!);
  return {
    facts: {
      members: snapshot.members,
      ties: snapshot.ties,
      components: snapshot.components,
      largestComponent: snapshot.largestComponent,
      weakest:
        weakest && groups.length > 1
          ? { name: weakest.name ?? `group ${weakest.letter}`, leaving: weakest.leaving }
          : null,
      mostShared: read[0] ? { attribute: read[0].name, explained: read[0].explained! } : null,
    },
    attributes: masked,
    picture: free
      ? picture
      : picture.map((one) => (shownIndices.has(one.group ?? -1) ? one : { ...one, group: null })),
    groups,
    openCases,
    unassigned,
    heldBack: lastImport?.problemsTotal ?? 0,
    before,
  };
}
