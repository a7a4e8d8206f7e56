import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { runOnce } from './children.mjs';
import { checkNode, fail, say } from './console.mjs';
import { ensurePackages } from './packages.mjs';

const MARK = 'dist/.sources';
const INPUTS = [
  'src',
  'db',
  'public',
  'tests/fakes',
  'astro.config.mjs',
  'tailwind.config.mjs',
  'tsconfig.json',
  'package-lock.json',
];

/** Programs beside the pages: the job process, its threads, migrations, the demo, the fakes. */
const BUNDLES = {
  'worker/worker': 'src/worker.ts',
  'worker/thread': 'src/thread.ts',
  'worker/migrate': 'db/migrate-main.ts',
  'worker/seed': 'db/seed.ts',
  'fakes/main': 'tests/fakes/main.ts',
};

function filesUnder(path) {
  if (!existsSync(path)) return [];
  const entries = readdirSync(path, { withFileTypes: true });
  return entries.flatMap((entry) =>
    entry.isDirectory() ? filesUnder(join(path, entry.name)) : [join(path, entry.name)],
  );
}

function sourcesHash() {
  const hash = createHash('sha256');
  const files = INPUTS.flatMap((path) => (/\.\w+$/.test(path) ? [path] : filesUnder(path))).sort();
  for (const file of files) hash.update(file).update(readFileSync(file));
  return hash.digest('hex');
}

async function bundle() {
  const { build, stop } = await import('esbuild');
  await build({
    entryPoints: Object.fromEntries(Object.entries(BUNDLES).map(([name, entry]) => [name, entry])),
    outdir: 'dist',
    outExtension: { '.js': '.mjs' },
    bundle: true,
    platform: 'node',
    format: 'esm',
    target: 'node20',
    packages: 'external',
    sourcemap: 'linked',
    logLevel: 'error',
  });
  await stop();
}

/** Builds pages and programs unless the last build was of exactly these sources. */
export async function ensureBuild() {
  const hash = sourcesHash();
  if (existsSync(MARK) && readFileSync(MARK, 'utf8') === hash) return;
  say('Building the pages and the job process');
  // A build that breaks off must not be taken for the one before it.
  rmSync(MARK, { force: true });
  await runOnce('The build', ['node_modules/astro/astro.js', 'build'], {
    ...process.env,
    NODE_ENV: 'production',
    ASTRO_TELEMETRY_DISABLED: '1',
  });
  // `astro build` empties dist, so the programs come after it.
  await bundle();
  mkdirSync('dist', { recursive: true });
  writeFileSync(MARK, hash);
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  checkNode();
  ensurePackages();
  await ensureBuild().catch((error) => fail(error.message));
  say('Built.');
}
