import { spawnSync } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { chmodSync, chownSync, existsSync, mkdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';

/** Where a cluster goes when the postgres user cannot walk to DATA_DIR. */
const ELSEWHERE = '/var/lib/thrum';

/** uid and gid to run PostgreSQL as: it refuses to run as root. */
export function owner() {
  if (process.getuid() !== 0) return {};
  const id = (flag) => Number(spawnSync('id', [flag, 'postgres'], { encoding: 'utf8' }).stdout.trim());
  const uid = id('-u');
  const gid = id('-g');
  if (!uid || !gid)
    throw new Error('There is no user named postgres; reinstall the package postgresql-common.');
  return { uid, gid };
}

/** The first folder on the way to `path` that others may not pass through, or null. */
function closedFolder(path) {
  for (let folder = path; folder !== dirname(folder); folder = dirname(folder))
    if ((statSync(folder).mode & 0o001) === 0) return folder;
  return null;
}

/**
 * A folder for the cluster that its user can reach: `dataDir/postgres`, or, for root with a closed folder on the way
 * (as /root is), one under /var/lib whose name is kept in `dataDir`. Nobody's folder is opened to others for it.
 */
export function clusterHome(dataDir, who, log) {
  const home = join(dataDir, 'postgres');
  mkdirSync(home, { recursive: true });
  if (!who.uid) return home;
  chownSync(home, who.uid, who.gid);
  chmodSync(home, 0o711);
  const pointer = join(dataDir, 'postgres-place');
  if (existsSync(join(home, 'initialised'))) return home;
  if (!existsSync(pointer)) {
    const closed = closedFolder(home);
    if (closed === null) return home;
    writeFileSync(pointer, join(ELSEWHERE, randomBytes(8).toString('hex')));
    log(
      `The postgres user cannot pass through ${closed}, so the database goes to ${readFileSync(pointer, 'utf8')}`,
    );
  }
  const place = readFileSync(pointer, 'utf8').trim();
  mkdirSync(place, { recursive: true, mode: 0o711 });
  chownSync(place, who.uid, who.gid);
  return place;
}
