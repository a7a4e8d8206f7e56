import { QueryTypes } from 'sequelize';
import { sequelize } from './models';

const WORKER_SECONDS = 15;

/** Does the database answer, and has a worker been heard of lately? */
export async function readiness(): Promise<{ database: boolean; worker: boolean }> {
  try {
    const [row] = await sequelize.query<{ fresh: boolean }>(
      'SELECT EXISTS (SELECT 1 FROM worker_processes WHERE heartbeat_at > now() - make_interval(secs => $1)) AS fresh',
      { bind: [WORKER_SECONDS], type: QueryTypes.SELECT },
    );
    return { database: true, worker: row?.fresh ?? false };
  } catch {
    return { database: false, worker: false };
  }
}
