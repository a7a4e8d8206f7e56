import { existsSync } from 'node:fs';
import { resolve } from 'node:path';
import { checkNode, fail } from './console.mjs';

const REQUIRED = [
  'DATABASE_URL',
  'AUTH_SECRET',
  'PUBLIC_URL',
  'SMTP_URL',
  'MAIL_FROM',
  'S3_ENDPOINT',
  'S3_REGION',
  'S3_BUCKET',
  'S3_ACCESS_KEY_ID',
  'S3_SECRET_ACCESS_KEY',
];

/** Production brings nothing up by itself: ends with a list of what is missing. */
export function requireProduction() {
  checkNode();
  process.chdir(resolve(import.meta.dirname, '../..'));
  const missing = REQUIRED.filter((name) => !process.env[name]);
  if (missing.length > 0)
    fail(`Set these variables first (README.md says what they mean): ${missing.join(', ')}`);
  if (!existsSync('dist/server/entry.mjs') || !existsSync('dist/worker/worker.mjs'))
    fail('There is no build yet. Run: npm ci && npm run build');
  process.env.NODE_ENV = 'production';
}
