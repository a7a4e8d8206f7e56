import type { Transaction } from 'sequelize';
import { sequelize } from '@/server/models';

const CHUNK = 10_000;

/** Writes one row a member, in chunks, in place of whatever was there. −1 means no group, NaN no entry. */
export async function saveMembers(
  groupingId: string,
  labels: Int32Array,
  vector: Float64Array | null,
  transaction: Transaction,
): Promise<void> {
  await sequelize.query('DELETE FROM grouping_members WHERE grouping_id = $1', {
    bind: [groupingId],
    transaction,
  });
  for (let from = 0; from < labels.length; from += CHUNK) {
    const count = Math.min(CHUNK, labels.length - from);
    const at = <T>(value: (member: number) => T): T[] =>
      Array.from({ length: count }, (_, i) => value(from + i));
    await sequelize.query(
      `INSERT INTO grouping_members (grouping_id, ordinal, group_index, vector)
       SELECT $1, * FROM unnest($2::int[], $3::int[], $4::float8[])`,
      {
        bind: [
          groupingId,
          at((member) => member),
          at((member) => (labels[member]! < 0 ? null : labels[member]!)),
          at((member) => (vector && Number.isFinite(vector[member]) ? vector[member]! : null)),
        ],
        transaction,
      },
    );
  }
}
