import { runOnce } from './children.mjs';
import { fail } from './console.mjs';
import { requireProduction } from './production.mjs';

requireProduction();
await runOnce('The migration', ['dist/worker/migrate.mjs'], process.env).catch((error) =>
  fail(error.message),
);
process.env.HOST ??= '127.0.0.1';
process.env.PORT ??= '4321';
await import('../../dist/server/entry.mjs');
