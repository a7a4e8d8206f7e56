import { QueryTypes, type Transaction } from 'sequelize';
import { sequelize } from '@/server/models';
import type { ImportProblem } from './imports';

const CHUNK = 5_000;

/** Keeps refused rows with their reasons. */
export async function saveProblems(
  importId: string,
  problems: readonly (ImportProblem & { kind: number })[],
  transaction: Transaction,
): Promise<void> {
  for (let from = 0; from < problems.length; from += CHUNK) {
    const part = problems.slice(from, from + CHUNK);
    await sequelize.query(
      `INSERT INTO import_problems (import_id, ordinal, file, line, "column", value, reason, kind)
       SELECT $1, * FROM unnest($2::int[], $3::text[], $4::int[], $5::text[], $6::text[], $7::text[], $8::int[])`,
      {
        bind: [
          importId,
          part.map((_, i) => from + i),
          part.map((one) => one.file),
          part.map((one) => one.line),
          part.map((one) => one.column),
          part.map((one) => one.value),
          part.map((one) => one.reason),
          part.map((one) => one.kind),
        ],
        type: QueryTypes.INSERT,
        transaction,
      },
    );
  }
}
