import { spawn, spawnSync } from 'node:child_process';
import { chmodSync, existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { installPackages } from '../../db/postgres/index.mjs';
import { ensureBuild } from './build.mjs';
import { checkNode, fail, say } from './console.mjs';
import { ensurePackages } from './packages.mjs';

checkNode();
process.chdir(resolve(import.meta.dirname, '../..'));
const asked = process.argv.slice(2);
const parts = asked.length > 0 ? asked : ['unit', 'integration', 'browser'];
const unknown = parts.filter((part) => !['unit', 'integration', 'browser'].includes(part));
if (unknown.length > 0)
  fail(`There is no part ${unknown.join(', ')}. Use unit, integration or browser, or nothing for all.`);

const folder = mkdtempSync(join(tmpdir(), 'thrum-run-'));
// The postgres user passes through it to its own folder.
chmodSync(folder, 0o711);
const total = { passed: 0, failed: 0, skipped: 0 };

const run = (args, env = {}) =>
  spawnSync(process.execPath, args, {
    stdio: ['ignore', 'inherit', 'inherit'],
    env: { ...process.env, ...env },
  }).status === 0;

/** Adds a runner's own count; a runner that failed without a count counts as one failure. */
function add(passed, failed, skipped, ok) {
  total.skipped += skipped;
  total.passed += passed;
  total.failed += failed > 0 || ok ? failed : 1;
}

function vitest(part) {
  say(`\n== ${part} tests`);
  const file = join(folder, `${part}.json`);
  const ok = run([
    'node_modules/vitest/vitest.mjs',
    'run',
    '--project',
    part,
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${file}`,
  ]);
  const result = existsSync(file)
    ? JSON.parse(readFileSync(file, 'utf8'))
    : { numPassedTests: 0, numFailedTests: 0, numPendingTests: 0, numTodoTests: 0 };
  add(result.numPassedTests, result.numFailedTests, result.numPendingTests + result.numTodoTests, ok);
}

const freePort = () =>
  new Promise((done) => {
    const server = createServer().listen(0, '127.0.0.1', () => {
      const { port } = server.address();
      server.close(() => done(port));
    });
  });

/** Starts Thrum as a new user would, on a free port with a data directory of its own. */
async function startThrum() {
  const port = await freePort();
  const child = spawn(process.execPath, ['src/run/start.mjs'], {
    env: {
      ...process.env,
      HOST: '127.0.0.1',
      PORT: String(port),
      DATA_DIR: join(folder, 'data'),
      DEMO: '1',
      DATABASE_URL: '',
    },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const stop = () =>
    new Promise((done) => {
      if (child.exitCode !== null) return done();
      child.once('exit', done);
      child.kill('SIGTERM');
    });
  const url = await new Promise((done) => {
    let text = '';
    child.stdout.on('data', (chunk) => {
      process.stdout.write(chunk);
      text += chunk;
      const ready = /^Thrum is ready at (\S+)$/m.exec(text);
      if (ready) done(ready[1]);
    });
    child.once('exit', () => done(null));
  });
  return { url, stop };
}

async function browser() {
  say('\n== browser tests');
  if (!existsSync('/usr/bin/chromium')) installPackages(['chromium', 'fonts-liberation'], say);
  const thrum = await startThrum();
  if (!thrum.url) return add(0, 1, 0, false);
  const file = join(folder, 'browser.json');
  const ok = run(
    ['node_modules/@playwright/test/cli.js', 'test', '--config', 'tests/browser/playwright.config.ts'],
    {
      THRUM_URL: thrum.url,
      THRUM_DATA_DIR: join(folder, 'data'),
      PLAYWRIGHT_JSON_OUTPUT_NAME: file,
    },
  );
  await thrum.stop();
  const stats = existsSync(file)
    ? JSON.parse(readFileSync(file, 'utf8')).stats
    : { expected: 0, flaky: 0, unexpected: 0, skipped: 0 };
  // A test that passed only when tried again is a failure that has not been understood.
  add(stats.expected, stats.unexpected + stats.flaky, stats.skipped, ok);
}

try {
  ensurePackages();
  if (parts.includes('unit')) vitest('unit');
  if (parts.includes('integration')) vitest('integration');
  if (parts.includes('browser')) {
    await ensureBuild();
    await browser();
  }
} catch (error) {
  process.stderr.write(`\n${error.message}\n`);
  total.failed++;
} finally {
  rmSync(folder, { recursive: true, force: true });
}
const skipped = total.skipped > 0 ? `, ${total.skipped} skipped` : '';
say(`\n${total.passed} passed, ${total.failed} failed${skipped}`);
process.exit(total.failed > 0 || total.passed === 0 ? 1 : 0);
