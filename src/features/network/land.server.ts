import type { Transaction } from 'sequelize';
import { Attribute, sequelize, Snapshot } from '@/server/models';
import { saveArray } from './arrays.server';
import { chunks, slice } from './chunks';
import type { Shape } from './compute';
import { memberIds } from './member-ids.server';
import { savePicture } from './picture.server';
import { summarise } from './summary';

/** Everything that becomes one snapshot. Arrays run in member order. */
export interface Landing {
  readonly workspaceId: string;
  readonly communityId: string;
  readonly importId: string | null;
  readonly createdBy: string | null;
  readonly takenOn: string;
  readonly label: string;
  readonly state: 'pending' | 'ready';
  readonly ids: readonly string[];
  /** What a member was called before, by present id; members without a change are not in it. */
  readonly formerOf: ReadonlyMap<string, string>;
  readonly names: readonly (string | null)[];
  readonly shape: Shape;
  /** Distinct ties, source < target. */
  readonly ties: {
    sources: Int32Array;
    targets: Int32Array;
    weights: Float64Array;
    counts: Int32Array;
    kinds: readonly (string | null)[];
  };
  readonly attributes: readonly {
    name: string;
    type: 'number' | 'label';
    direction: 'higher-better' | 'higher-worse' | 'neither';
    sensitive: boolean;
    countOf: string | null;
    values: Float64Array;
    labels: readonly (string | null)[] | null;
  }[];
}

type Report = (done: number, step: string) => void;

async function saveMembers(landing: Landing, snapshotId: string, transaction: Transaction): Promise<void> {
  const { ids, names, shape } = landing;
  const members = await memberIds(landing, transaction);
  const { offsets, strength } = shape.network;
  for (const { from, count } of chunks(ids.length))
    await sequelize.query(
      `INSERT INTO snapshot_members (snapshot_id, ordinal, member_id, external_id, name, component, degree, strength, x, y)
       SELECT $1, * FROM unnest($2::int[], $3::uuid[], $4::text[], $5::text[], $6::int[], $7::int[], $8::float8[], $9::float8[], $10::float8[])`,
      {
        bind: [
          snapshotId,
          slice(from, count, (i) => i),
          slice(from, count, (i) => members[i]!),
          slice(from, count, (i) => ids[i]!),
          slice(from, count, (i) => names[i] ?? null),
          slice(from, count, (i) => shape.component[i]!),
          slice(from, count, (i) => offsets[i + 1]! - offsets[i]!),
          slice(from, count, (i) => strength[i]!),
          slice(from, count, (i) => shape.x[i]!),
          slice(from, count, (i) => shape.y[i]!),
        ],
        transaction,
      },
    );
}

async function saveTies(
  { ties }: Landing,
  snapshotId: string,
  report: Report,
  transaction: Transaction,
): Promise<void> {
  const total = ties.sources.length;
  for (const { from, count } of chunks(total)) {
    await sequelize.query(
      `INSERT INTO ties (snapshot_id, source, target, weight, count, kind)
       SELECT $1, * FROM unnest($2::int[], $3::int[], $4::float8[], $5::int[], $6::text[])`,
      {
        bind: [
          snapshotId,
          slice(from, count, (i) => ties.sources[i]!),
          slice(from, count, (i) => ties.targets[i]!),
          slice(from, count, (i) => ties.weights[i]!),
          slice(from, count, (i) => ties.counts[i]!),
          slice(from, count, (i) => ties.kinds[i]!),
        ],
        transaction,
      },
    );
    report(0.3 + (0.6 * (from + count)) / total, 'Keeping ties');
  }
}

async function saveAttributes(landing: Landing, snapshotId: string, transaction: Transaction): Promise<void> {
  const n = landing.ids.length;
  for (const [ordinal, one] of landing.attributes.entries()) {
    // Members first met in the ties come after those of the file and have no value.
    const values = new Float64Array(n).fill(NaN);
    values.set(one.values);
    const has = (i: number): boolean => (one.labels ? one.labels[i] != null : !Number.isNaN(values[i]!));
    const places = slice(0, n, (i) => i).filter(has);
    const attribute = await Attribute.create(
      {
        snapshotId,
        ordinal,
        name: one.name,
        type: one.type,
        direction: one.direction,
        sensitive: one.sensitive,
        countOf: one.countOf,
        observed: places.length,
        summary: summarise(one.type, values, one.labels),
      },
      { transaction },
    );
    for (const { from, count } of chunks(places.length)) {
      const part = places.slice(from, from + count);
      await sequelize.query(
        `INSERT INTO attribute_values (attribute_id, ordinal, value, label)
         SELECT $1, * FROM unnest($2::int[], $3::float8[], $4::text[])`,
        {
          bind: [
            attribute.id,
            part,
            part.map((i) => (one.labels ? null : values[i]!)),
            part.map((i) => one.labels?.[i] ?? null),
          ],
          transaction,
        },
      );
    }
    if (one.type === 'number') await saveArray(snapshotId, `attribute:${attribute.id}`, values, transaction);
  }
}

/** Writes a whole snapshot in the caller's transaction: all of it or nothing. */
export async function landSnapshot(
  landing: Landing,
  report: Report,
  transaction: Transaction,
): Promise<Snapshot> {
  const { shape, ties } = landing;
  const snapshot = await Snapshot.create(
    {
      workspaceId: landing.workspaceId,
      communityId: landing.communityId,
      importId: landing.importId,
      createdBy: landing.createdBy,
      takenOn: landing.takenOn,
      label: landing.label,
      state: landing.state,
      members: landing.ids.length,
      ties: ties.sources.length,
      totalWeight: ties.weights.reduce((sum, weight) => sum + weight, 0),
      components: shape.components,
      largestComponent: shape.largestComponent,
      isolated: shape.isolated,
    },
    { transaction },
  );
  report(0, 'Keeping members');
  await saveMembers(landing, snapshot.id, transaction);
  report(0.25, 'Keeping ties');
  await saveTies(landing, snapshot.id, report, transaction);
  report(0.9, 'Keeping attributes');
  await saveAttributes(landing, snapshot.id, transaction);
  const { offsets, targets, weights, strength } = shape.network;
  const arrays = { offsets, targets, weights, strength, x: shape.x, y: shape.y, component: shape.component };
  for (const [name, values] of Object.entries(arrays))
    await saveArray(snapshot.id, name, values, transaction);
  await savePicture(snapshot.id, shape, ties, transaction);
  return snapshot;
}
