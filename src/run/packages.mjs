import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { fail, say } from './console.mjs';

const MARK = 'node_modules/.thrum-lock';

/** Installs the packages of the lock file when they are missing or the lock file has changed. */
export function ensurePackages() {
  const lock = createHash('sha256').update(readFileSync('package-lock.json')).digest('hex');
  if (existsSync(MARK) && readFileSync(MARK, 'utf8') === lock) return;
  say('Installing packages (once; a few minutes)');
  const result = spawnSync('npm', ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'], {
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  if (result.status !== 0)
    fail(
      'The packages could not be installed. Check the network and run this again; nothing else was changed.',
    );
  writeFileSync(MARK, lock);
}
