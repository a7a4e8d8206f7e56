import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fail } from './console.mjs';

/** Holds DATA_DIR for this process; a lock whose process is gone is taken over. */
export function holdDataDir(dataDir) {
  mkdirSync(dataDir, { recursive: true });
  const file = join(dataDir, 'thrum.pid');
  if (existsSync(file)) {
    const pid = Number(readFileSync(file, 'utf8'));
    let running;
    try {
      // The number may have been given to another program since; ours is a node that runs start.mjs.
      running = pid !== process.pid && readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes('start.mjs');
    } catch {
      running = false;
    }
    if (running)
      fail(
        `Thrum is running already with this DATA_DIR (process ${pid}). Stop it first, or set another DATA_DIR and PORT.`,
      );
  }
  writeFileSync(file, String(process.pid));
  return () => rmSync(file, { force: true });
}
