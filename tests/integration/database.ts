import { randomBytes } from 'node:crypto';
import pg from 'pg';
import { TEMPLATE } from './template';

export interface TestDatabase {
  readonly url: string;
  drop(): Promise<void>;
}

async function asAdmin(statement: string): Promise<void> {
  const client = new pg.Client(process.env.THRUM_TEST_ADMIN_URL);
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}

/**
 * A migrated database for one test file. Sets DATABASE_URL, so call it before anything imports the models
 * (import those dynamically, after it).
 */
export async function createTestDatabase(): Promise<TestDatabase> {
  const name = `thrum_${randomBytes(6).toString('hex')}`;
  await asAdmin(`CREATE DATABASE ${name} TEMPLATE ${TEMPLATE}`);
  const url = new URL(process.env.THRUM_TEST_ADMIN_URL!);
  url.pathname = `/${name}`;
  process.env.DATABASE_URL = url.href;
  return { url: url.href, drop: () => asAdmin(`DROP DATABASE ${name} WITH (FORCE)`) };
}
