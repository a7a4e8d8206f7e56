import type { Transaction } from 'sequelize';
import { sequelize } from '@/server/models';
import type { ReadingColumns } from './compute';

const CHUNK = 10_000;
const QUADRANTS = [null, 'HH', 'LL', 'HL', 'LH'] as const;

/** Writes one row a member, in chunks, in place of whatever was there. NaN becomes NULL. */
export async function saveMembers(
  readingId: string,
  columns: ReadingColumns,
  transaction: Transaction,
): Promise<void> {
  await sequelize.query('DELETE FROM reading_members WHERE reading_id = $1', {
    bind: [readingId],
    transaction,
  });
  const n = columns.observed.length;
  for (let from = 0; from < n; from += CHUNK) {
    const to = Math.min(n, from + CHUNK);
    const numbers = (values: Float64Array): (number | null)[] =>
      Array.from(values.subarray(from, to), (value) => (Number.isFinite(value) ? value : null));
    const flags = (values: Uint8Array): boolean[] =>
      Array.from(values.subarray(from, to), (one) => one === 1);
    const { local } = columns;
    await sequelize.query(
      `INSERT INTO reading_members (reading_id, ordinal, value, smoothed, standard_error, departure, leverage, z, p, q,
         observed, tested, neighbours, local_i, local_expectation, local_variance, local_z, local_p, local_q,
         local_permutation_p, quadrant)
       SELECT $1, * FROM unnest($2::int[], $3::float8[], $4::float8[], $5::float8[], $6::float8[], $7::float8[],
         $8::float8[], $9::float8[], $10::float8[], $11::bool[], $12::bool[], $13::int[], $14::float8[], $15::float8[],
         $16::float8[], $17::float8[], $18::float8[], $19::float8[], $20::float8[], $21::text[])`,
      {
        bind: [
          readingId,
          Array.from({ length: to - from }, (_, i) => from + i),
          numbers(columns.value),
          numbers(columns.smoothed),
          numbers(columns.standardError),
          numbers(columns.departure),
          numbers(columns.leverage),
          numbers(columns.z),
          numbers(columns.p),
          numbers(columns.q),
          flags(columns.observed),
          flags(columns.tested),
          Array.from(columns.neighbours.subarray(from, to)),
          numbers(local.I),
          numbers(local.expectation),
          numbers(local.variance),
          numbers(local.z),
          numbers(local.p),
          numbers(local.q),
          numbers(columns.localPermutationP),
          Array.from(local.quadrant.subarray(from, to), (code) => QUADRANTS[code] ?? null),
        ],
        transaction,
      },
    );
  }
}
