import { spawnSync } from 'node:child_process';
import { resolve } from 'node:path';
import { checkNode, say } from './console.mjs';
import { ensurePackages } from './packages.mjs';

checkNode();
process.chdir(resolve(import.meta.dirname, '../..'));
ensurePackages();

const CHECKS = {
  'Style (Prettier)': ['node_modules/prettier/bin/prettier.cjs', '--check', '--log-level=warn', '.'],
  'Code (ESLint)': [
    'node_modules/eslint/bin/eslint.js',
    '.',
    '--max-warnings=0',
    '--cache',
    '--cache-location',
    'node_modules/.cache/eslint/',
  ],
  'Types (astro check)': ['node_modules/astro/astro.js', 'check', '--minimumSeverity', 'error'],
  'Import rules': [
    'node_modules/dependency-cruiser/bin/dependency-cruise.mjs',
    '--config',
    'tests/dependency-cruiser.mjs',
    'src',
    'db',
    'tests',
  ],
};

let failed = 0;
for (const [name, args] of Object.entries(CHECKS)) {
  say(`== ${name}`);
  const env = { ...process.env, ASTRO_TELEMETRY_DISABLED: '1' };
  if (spawnSync(process.execPath, args, { stdio: ['ignore', 'inherit', 'inherit'], env }).status !== 0)
    failed++;
}
say(failed === 0 ? 'Lint is clean.' : `${failed} of ${Object.keys(CHECKS).length} checks found something.`);
process.exit(failed === 0 ? 0 : 1);
