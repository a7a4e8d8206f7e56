import type { Transaction } from 'sequelize';
import { Attribute, AttributeValue, SnapshotArray } from '@/server/models';
import type { Network } from '@/numerics/types';

/** Packed copies of a snapshot's network, so that a worker loads it in one read. Little-endian. */
type Packed = Int32Array | Float64Array | Float32Array;

const typeOf = (values: Packed): 'int32' | 'float64' | 'float32' =>
  values instanceof Int32Array ? 'int32' : values instanceof Float64Array ? 'float64' : 'float32';

export async function saveArray(
  snapshotId: string,
  name: string,
  values: Packed,
  transaction: Transaction,
): Promise<void> {
  const bytes = Buffer.from(values.buffer, values.byteOffset, values.byteLength);
  await SnapshotArray.upsert({ snapshotId, name, type: typeOf(values), bytes }, { transaction });
}

/** @returns a fresh array that owns its memory. */
export async function loadArray(snapshotId: string, name: string): Promise<Packed> {
  const row = await SnapshotArray.findOne({ where: { snapshotId, name } });
  if (!row) throw new Error(`snapshot ${snapshotId} has no array ${name}`);
  const owned = new Uint8Array(row.bytes).buffer;
  if (row.type === 'int32') return new Int32Array(owned);
  return row.type === 'float64' ? new Float64Array(owned) : new Float32Array(owned);
}

/** The CSR network of a snapshot, in the order of its members. */
export async function loadNetwork(snapshotId: string): Promise<Network> {
  const [offsets, targets, weights, strength] = await Promise.all(
    ['offsets', 'targets', 'weights', 'strength'].map((name) => loadArray(snapshotId, name)),
  );
  return {
    n: offsets!.length - 1,
    offsets: offsets as Int32Array,
    targets: targets as Int32Array,
    weights: weights as Float64Array,
    strength: strength as Float64Array,
  };
}

/** Values of one numeric attribute by member, NaN where missing. Kept packed under `attribute:<id>`. */
export async function loadAttribute(snapshotId: string, attributeId: string): Promise<Float64Array> {
  return (await loadArray(snapshotId, `attribute:${attributeId}`)) as Float64Array;
}

/** Attributes of a snapshot in the order of the members file. */
export const attributesOf = (snapshotId: string): Promise<Attribute[]> =>
  Attribute.findAll({ where: { snapshotId }, order: [['ordinal', 'ASC']] });

/** Labels of one label attribute by member, null where missing. */
export async function loadLabels(attributeId: string, n: number): Promise<(string | null)[]> {
  const labels = new Array<string | null>(n).fill(null);
  const rows = await AttributeValue.findAll({ where: { attributeId }, raw: true });
  for (const row of rows) labels[row.ordinal] = row.label;
  return labels;
}
