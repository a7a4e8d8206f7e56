import type { Transaction } from 'sequelize';
import { QueryTypes } from 'sequelize';
import { Job, sequelize } from '../models';

export interface NewJob {
  /** Key of the job registry in src/worker.ts. */
  readonly kind: string;
  /** Id of the row that the job works on; payloads never carry data. */
  readonly targetId: string;
  readonly workspaceId: string | null;
  readonly createdBy: string | null;
}

/** How often a job is tried when its worker dies or the database goes away; its own errors are final. */
const ATTEMPTS = 5;

/**
 * Writes a job and its queue entry in the caller's transaction: both happen or neither does.
 * @returns the job row, state `queued`.
 */
export async function enqueue(job: NewJob, transaction: Transaction): Promise<Job> {
  const row = await Job.create({ ...job }, { transaction });
  await sequelize.query(
    `SELECT graphile_worker.add_job('run', json_build_object('jobId', $1::text), job_key := $1, max_attempts := $2)`,
    { bind: [row.id, ATTEMPTS], type: QueryTypes.SELECT, transaction },
  );
  return row;
}
