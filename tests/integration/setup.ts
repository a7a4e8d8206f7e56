import { randomBytes } from 'node:crypto';
import { chmodSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { build } from 'esbuild';
import { ensurePostgres } from '../../db/postgres/index.mjs';
import { migrate } from '../../db/migrate';
import { startFakes } from '../fakes';
import { TEMPLATE } from './template';

/** Once for all integration tests: PostgreSQL, a migrated template, the fakes, and the thread bundle. */
export default async function setup(): Promise<() => Promise<void>> {
  const folder = mkdtempSync(join(tmpdir(), 'thrum-test-'));
  // The postgres user passes through it to its own folder.
  chmodSync(folder, 0o711);
  const postgres = await ensurePostgres({
    dataDir: folder,
    log: (line) => process.stdout.write(`${line}\n`),
  });
  const fakes = await startFakes({ dataDir: folder });
  const thread = join(folder, 'thread.mjs');
  await build({
    entryPoints: ['src/thread.ts'],
    outfile: thread,
    bundle: true,
    platform: 'node',
    format: 'esm',
    target: 'node20',
    // Bundled outside the checkout, so nothing may be left to resolve from there.
    banner: {
      js: "import { createRequire } from 'node:module'; const require = createRequire(import.meta.url);",
    },
    tsconfig: resolve('tsconfig.json'),
    logLevel: 'error',
  });
  const template = new URL(postgres.adminUrl);
  template.pathname = `/${TEMPLATE}`;
  const { default: pg } = await import('pg');
  const admin = new pg.Client(postgres.adminUrl);
  await admin.connect();
  await admin.query(`CREATE DATABASE ${TEMPLATE}`);
  await admin.end();
  await migrate(template.href);
  Object.assign(process.env, fakes.env, {
    THRUM_TEST_ADMIN_URL: postgres.adminUrl,
    THRUM_THREAD_ENTRY: thread,
    DATABASE_URL: template.href,
    AUTH_SECRET: randomBytes(32).toString('hex'),
    PUBLIC_URL: 'http://thrum.test',
    MAIL_FROM: 'Thrum <thrum@test.example>',
    LOG_LEVEL: 'silent',
  });
  return async () => {
    await fakes.stop();
    await postgres.stop();
    rmSync(folder, { recursive: true, force: true });
  };
}
