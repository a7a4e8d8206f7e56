import {
  authFlowTestSuite,
  caseInsensitiveTestSuite,
  normalTestSuite,
  numberIdTestSuite,
  testAdapter,
  transactionsTestSuite,
  uuidTestSuite,
} from '@better-auth/test-utils/adapter';
import { Sequelize } from 'sequelize';
import { sequelizeAdapter } from '@/features/account/adapter/index.server';
import { authModels } from '@/features/account/adapter/models.server';
import { createTestDatabase } from './database';

// better-auth's own published tests for storage adapters, against PostgreSQL.
const database = await createTestDatabase();
const sequelize = new Sequelize(database.url, { dialect: 'postgres', logging: false });
await sequelize.query('DROP SCHEMA public CASCADE; CREATE SCHEMA public');

const { execute } = await testAdapter({
  adapter: () => sequelizeAdapter(sequelize),
  runMigrations: async (options) => {
    await sequelize.query('DROP SCHEMA public CASCADE; CREATE SCHEMA public');
    for (const model of authModels(sequelize, options).values()) await model.sync({ force: true });
  },
  tests: [
    normalTestSuite(),
    authFlowTestSuite(),
    transactionsTestSuite(),
    caseInsensitiveTestSuite(),
    uuidTestSuite(),
    numberIdTestSuite(),
  ],
  onFinish: async () => {
    await sequelize.close();
    await database.drop();
  },
});
execute();
