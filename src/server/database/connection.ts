import { Sequelize } from 'sequelize';
import { config } from '../config';

/**
 * The one Sequelize instance of this process. Nothing connects before the first query.
 * Dropped connections are replaced by the pool; a query that met one is retried where it is safe.
 */
export const sequelize = new Sequelize(config().DATABASE_URL, {
  dialect: 'postgres',
  logging: false,
  pool: { max: 10, min: 0, idle: 10_000, acquire: 30_000 },
  define: { underscored: true, timestamps: false },
  dialectOptions: { keepAlive: true, application_name: 'thrum' },
});
