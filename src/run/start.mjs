import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { join, resolve } from 'node:path';
import { ensurePostgres } from '../../db/postgres/index.mjs';
import { ensureBuild } from './build.mjs';
import { endAll, endLeftovers, keepRunning, runOnce, startAndRead } from './children.mjs';
import { checkNode, fail, say } from './console.mjs';
import { holdDataDir } from './lock.mjs';
import { ensurePackages } from './packages.mjs';

/** A random secret that is made once and kept, readable by this user only. */
function keptSecret(dataDir) {
  const file = join(dataDir, 'auth-secret');
  if (!existsSync(file)) writeFileSync(file, randomBytes(32).toString('hex'), { mode: 0o600 });
  return readFileSync(file, 'utf8').trim();
}

function checkPort(host, port) {
  return new Promise((done) => {
    const probe = createServer();
    probe.once('error', (error) =>
      fail(
        error.code === 'EADDRINUSE'
          ? `Port ${port} on ${host} is taken. Stop what uses it, or start with another: PORT=${port + 1} npm start`
          : `Thrum cannot listen on ${host}:${port} (${error.code}). Set HOST and PORT to an address of this machine.`,
      ),
    );
    probe.listen(port, host, () => probe.close(done));
  });
}

async function untilReady(url) {
  for (let tries = 0; tries < 240; tries++) {
    const ready = await fetch(`${url}/readyz`).then(
      (response) => response.ok,
      () => false,
    );
    if (ready) return;
    await new Promise((done) => setTimeout(done, 500));
  }
  throw new Error('The pages and the job process did not both answer within two minutes.');
}

checkNode();
process.chdir(resolve(import.meta.dirname, '../..'));
const host = process.env.HOST || '127.0.0.1';
const port = Number(process.env.PORT || 4321);
const dataDir = resolve(process.env.DATA_DIR || '.data');
if (!Number.isInteger(port) || port < 1 || port > 65535) fail('PORT must be a number from 1 to 65535.');
const letGo = holdDataDir(dataDir);
let starting = null;
let ending = null;

function end(code) {
  ending ??= (async () => {
    await endAll();
    // A signal may come while the database is still coming up.
    await (await starting?.catch(() => null))?.stop();
    letGo();
    process.exit(code);
  })();
  return ending;
}
process.on('SIGINT', () => void end(0));
process.on('SIGTERM', () => void end(0));

try {
  await endLeftovers(join(dataDir, 'children.json'));
  await checkPort(host, port);
  ensurePackages();
  // An empty variable is one that is not set.
  const given = Object.fromEntries(Object.entries(process.env).filter(([, value]) => value !== ''));
  if (!given.DATABASE_URL) {
    say('Starting PostgreSQL');
    starting = ensurePostgres({ dataDir, log: say });
  }
  const postgres = await starting;
  if (ending) await ending;
  await ensureBuild();
  const address = `http://${host.includes(':') ? `[${host}]` : host}:${port}`;
  const base = { ...given, HOST: host, PORT: String(port), DATA_DIR: dataDir, NODE_ENV: 'production' };
  const fakes =
    given.SMTP_URL && given.S3_ENDPOINT ? {} : await startAndRead('fakes', ['dist/fakes/main.mjs'], base);
  const env = {
    MAIL_FROM: 'Thrum <thrum@localhost.example>',
    DEMO: '1',
    AUTH_SECRET: given.AUTH_SECRET ?? keptSecret(dataDir),
    PUBLIC_URL: address,
    DATABASE_URL: postgres?.url,
    ...fakes,
    ...base,
  };
  say('Bringing the database up to date');
  await runOnce('The migration', ['dist/worker/migrate.mjs'], env);
  if (env.DEMO === '1') {
    say('Checking the demo (the first time it is made, which takes about two minutes)');
    await runOnce('Making the demo', ['dist/worker/seed.mjs'], env);
  }
  if (ending) await ending;
  keepRunning('worker', ['dist/worker/worker.mjs'], env);
  keepRunning('web', ['dist/server/entry.mjs'], env);
  await untilReady(address);
  say(`Thrum is ready at http://${host}:${port}`);
} catch (error) {
  if (!ending) {
    process.stderr.write(`\n${error.message}\n`);
    await end(1);
  }
}
