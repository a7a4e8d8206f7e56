import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, readdirSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';

const ROOT = '/usr/lib/postgresql';
const CLUSTER_CONF = '/etc/postgresql-common/createcluster.conf';

/** Folder of PostgreSQL's programs of `version`, or of the newest there is, or null. */
export function findBinaries(version = null) {
  if (!existsSync(ROOT)) return null;
  const versions = readdirSync(ROOT)
    .filter((name) => /^\d+$/.test(name) && existsSync(join(ROOT, name, 'bin', 'initdb')))
    .filter((name) => version === null || name === version)
    .sort((a, b) => Number(b) - Number(a));
  return versions.length > 0 ? join(ROOT, versions[0], 'bin') : null;
}

/**
 * Installs Debian packages, as root or with sudo.
 * @throws Error that says what to ask for, where neither works
 */
export function installPackages(packages, log) {
  const root = process.getuid() === 0;
  const sudo = root ? [] : ['sudo', '-n'];
  const remedy = `Ask an administrator to run: apt-get install ${packages.join(' ')}`;
  if (!existsSync('/usr/bin/apt-get')) throw new Error(`This machine has no apt-get. ${remedy}`);
  if (!root && spawnSync('sudo', ['-n', 'true'], { stdio: 'ignore' }).status !== 0)
    throw new Error(`Installing ${packages.join(', ')} needs root or sudo without a password. ${remedy}`);
  const run = (args) => {
    const command = [
      ...sudo,
      'env',
      'DEBIAN_FRONTEND=noninteractive',
      'apt-get',
      '-o',
      'DPkg::Lock::Timeout=300',
      ...args,
    ];
    return spawnSync(command[0], command.slice(1), { stdio: ['ignore', 'ignore', 'pipe'], encoding: 'utf8' });
  };
  log(`Installing ${packages.join(', ')} from Debian's packages (once)`);
  const args = ['install', '-y', '--no-install-recommends', ...packages];
  let result = run(args);
  if (result.status !== 0) {
    run(['update']);
    result = run(args);
  }
  if (result.status !== 0)
    throw new Error(
      `${packages.join(', ')} could not be installed. ${remedy}\n${result.stderr.trim().split('\n').at(-1)}`,
    );
}

/**
 * Folder of PostgreSQL's programs, installing them if missing.
 * @param {string | null} version major version that an existing cluster was made with, since no other can open it
 */
export function ensureBinaries(version, log) {
  const found = findBinaries(version);
  if (found) return found;
  if (version !== null && findBinaries())
    throw new Error(
      `The cluster in DATA_DIR was made by PostgreSQL ${version}, which is not installed any more. ` +
        `Install postgresql-${version}, or set another DATA_DIR.`,
    );
  // Debian would start a cluster of its own on the usual port; ours lives in DATA_DIR.
  if (!existsSync(CLUSTER_CONF)) {
    const line = 'create_main_cluster = false\n';
    if (process.getuid() === 0) {
      mkdirSync(dirname(CLUSTER_CONF), { recursive: true });
      writeFileSync(CLUSTER_CONF, line);
    } else {
      // Where sudo needs a password this does nothing, and the next step says so.
      spawnSync('sudo', ['-n', 'mkdir', '-p', dirname(CLUSTER_CONF)], { stdio: 'ignore' });
      spawnSync('sudo', ['-n', 'tee', CLUSTER_CONF], { input: line, stdio: ['pipe', 'ignore', 'ignore'] });
    }
  }
  installPackages(['postgresql'], log);
  const installed = findBinaries();
  if (!installed)
    throw new Error('PostgreSQL was installed but its programs are not where Debian puts them.');
  return installed;
}
