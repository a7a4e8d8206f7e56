import { runMigrations as migrateQueue } from 'graphile-worker';
import { QueryTypes, Sequelize } from 'sequelize';
import { SequelizeStorage, Umzug } from 'umzug';
import { migrations } from './migrations';

const LOCK = 7_264_001;

/**
 * Brings the schema of the database at `url` up to date, the queue's own tables included.
 * Safe to run from several processes at once: an advisory lock lets one work while the others wait.
 */
export async function migrate(url: string): Promise<void> {
  // A pool of one, so that the advisory lock and everything done under it share a session.
  const sequelize = new Sequelize(url, {
    dialect: 'postgres',
    logging: false,
    pool: { max: 1, min: 1, idle: 600_000 },
  });
  try {
    await sequelize.query('SELECT pg_advisory_lock($1)', { bind: [LOCK], type: QueryTypes.SELECT });
    const umzug = new Umzug({
      migrations: migrations.map(({ name, up }) => ({
        name,
        up: () => sequelize.query(`BEGIN; ${up} COMMIT;`),
      })),
      storage: new SequelizeStorage({ sequelize, tableName: 'schema_migrations' }),
      logger: undefined,
    });
    await umzug.up();
    await migrateQueue({ connectionString: url });
  } finally {
    await sequelize.close();
  }
}
