import { QueryTypes } from 'sequelize';
import { sequelize, SnapshotMember } from '@/server/models';
import { attributesOf, loadAttribute, loadLabels } from './arrays.server';

/** All that a snapshot was loaded with, in the order of its members. */
export interface WholeSnapshot {
  readonly takenOn: string;
  readonly ids: string[];
  readonly names: (string | null)[];
  /** Distinct ties, source < target, sorted. */
  readonly ties: {
    readonly sources: Int32Array;
    readonly targets: Int32Array;
    readonly weights: Float64Array;
    readonly counts: Int32Array;
    readonly kinds: (string | null)[];
  };
  readonly attributes: {
    readonly name: string;
    readonly type: 'number' | 'label';
    readonly direction: 'higher-better' | 'higher-worse' | 'neither';
    readonly sensitive: boolean;
    readonly countOf: string | null;
    readonly values: Float64Array;
    readonly labels: (string | null)[] | null;
  }[];
}

/** Rows of ties read at once: memory stays at the arrays. */
const PAGE = 100_000;
interface TieRow {
  source: number;
  target: number;
  weight: number;
  count: number;
  kind: string | null;
}

async function tiesOf(snapshotId: string, total: number): Promise<WholeSnapshot['ties']> {
  const sources = new Int32Array(total);
  const targets = new Int32Array(total);
  const weights = new Float64Array(total);
  const counts = new Int32Array(total);
  const kinds: (string | null)[] = [];
  let after: [number, number] = [-1, -1];
  for (;;) {
    const rows = await sequelize.query<TieRow>(
      `SELECT source, target, weight, count, kind FROM ties
       WHERE snapshot_id = $1 AND (source, target) > ($2, $3) ORDER BY source, target LIMIT $4`,
      { bind: [snapshotId, ...after, PAGE], type: QueryTypes.SELECT },
    );
    for (const row of rows) {
      const at = kinds.length;
      sources[at] = row.source;
      targets[at] = row.target;
      weights[at] = row.weight;
      counts[at] = row.count;
      kinds.push(row.kind);
    }
    if (rows.length < PAGE) break;
    const last = rows.at(-1)!;
    after = [last.source, last.target];
  }
  return { sources, targets, weights, counts, kinds };
}

/** Loads a snapshot back, as for adding changes to it. The caller has made sure of the workspace. */
export async function wholeSnapshot(row: {
  id: string;
  takenOn: string;
  ties: number;
}): Promise<WholeSnapshot> {
  const members = await SnapshotMember.findAll({
    where: { snapshotId: row.id },
    attributes: ['externalId', 'name'],
    order: [['ordinal', 'ASC']],
    raw: true,
  });
  const attributes: WholeSnapshot['attributes'] = [];
  for (const one of await attributesOf(row.id))
    attributes.push({
      name: one.name,
      type: one.type,
      direction: one.direction,
      sensitive: one.sensitive,
      countOf: one.countOf,
      values: one.type === 'number' ? await loadAttribute(row.id, one.id) : new Float64Array(),
      labels: one.type === 'label' ? await loadLabels(one.id, members.length) : null,
    });
  return {
    takenOn: row.takenOn,
    ids: members.map((one) => one.externalId),
    names: members.map((one) => one.name),
    ties: await tiesOf(row.id, row.ties),
    attributes,
  };
}
