import { spawn } from 'node:child_process';
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';

const children = [];
let ending = false;

const hasEnded = (child) => child.exitCode !== null || child.signalCode !== null;

let pidFile = '';
const notePids = () => {
  const pids = children.filter(({ child }) => child && !hasEnded(child)).map(({ child }) => child.pid);
  if (pidFile) writeFileSync(pidFile, JSON.stringify(pids));
};

/** The noted numbers; none where the machine went down while they were written. */
function notedPids(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return [];
  }
}

/** Keeps the children's process numbers in `file`, after ending those that a crashed run left there. */
export async function endLeftovers(file) {
  pidFile = file;
  if (!existsSync(file)) return;
  // The number may have been given to another program since; one that ended and waits to be collected has no command.
  const ours = (pid) => /dist\/(worker|server|fakes)\//.test(readFileSync(`/proc/${pid}/cmdline`, 'utf8'));
  for (const pid of notedPids(file)) {
    try {
      if (!ours(pid)) continue;
      process.kill(pid, 'SIGKILL');
      for (let i = 0; i < 100 && ours(pid); i++) await new Promise((resolve) => setTimeout(resolve, 50));
    } catch {
      // Gone already.
    }
  }
  rmSync(file, { force: true });
}

/** Prints a child's lines with its name, leaving out what a person at the terminal need not see. */
function relay(name, stream, show) {
  let held = '';
  stream.on('data', (chunk) => {
    const lines = (held + chunk).split('\n');
    held = lines.pop() ?? '';
    for (const line of lines) if (show(line)) process.stderr.write(`[${name}] ${line}\n`);
  });
}

/** Log lines are JSON with a level; warnings and worse are shown, and anything that is not JSON. */
const worthShowing = (line) => {
  if (!line.trim()) return false;
  const level = /^\{"level":(\d+)/.exec(line)?.[1];
  if (level) return Number(level) >= 40;
  return !/NodeVersionSupportWarning|AWS SDK|no longer support|more information|To continue receiving|and security updates|versions published|will require node|trace-warnings|Server listening|^\s*$|a\.co/i.test(
    line,
  );
};

/** Starts a program that is started again, a little later each time, when it dies. */
export function keepRunning(name, args, env) {
  if (ending) return;
  const entry = { name, child: null };
  children.push(entry);
  let failures = 0;
  const start = () => {
    const since = Date.now();
    const child = spawn(process.execPath, args, { env, stdio: ['ignore', 'pipe', 'pipe'], detached: true });
    entry.child = child;
    notePids();
    relay(name, child.stdout, worthShowing);
    relay(name, child.stderr, worthShowing);
    child.once('exit', (code, signal) => {
      if (ending) return;
      failures = Date.now() - since > 30_000 ? 1 : failures + 1;
      const wait = Math.min(30, 2 ** (failures - 1));
      process.stderr.write(`[${name}] ended (${signal ?? code}); starting again in ${wait} s\n`);
      setTimeout(() => !ending && start(), wait * 1000);
    });
  };
  start();
}

/** Runs a program to its end and answers with its last lines when it fails. */
export function runOnce(name, args, env) {
  if (ending) return Promise.reject(new Error('Thrum is ending.'));
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, args, { env, stdio: ['ignore', 'pipe', 'pipe'] });
    children.push({ name, child });
    notePids();
    let tail = '';
    const keep = (chunk) => (tail = (tail + chunk).slice(-4000));
    child.stdout.on('data', keep);
    child.stderr.on('data', keep);
    child.once('exit', (code) =>
      code === 0 ? resolve(tail) : reject(new Error(`${name} failed.\n${tail.trim()}`)),
    );
  });
}

/** Starts a program that prints one line of JSON when it is ready, and answers with it. */
export function startAndRead(name, args, env) {
  if (ending) return Promise.reject(new Error('Thrum is ending.'));
  const child = spawn(process.execPath, args, { env, stdio: ['ignore', 'pipe', 'pipe'], detached: true });
  children.push({ name, child });
  notePids();
  relay(name, child.stderr, worthShowing);
  return new Promise((resolve, reject) => {
    let text = '';
    child.stdout.on('data', (chunk) => {
      text += chunk;
      if (text.includes('\n')) resolve(JSON.parse(text.split('\n')[0]));
    });
    child.once('exit', () => reject(new Error(`${name} did not start.`)));
  });
}

/** Ends every child, the last started first; one that does not listen is killed. */
export async function endAll() {
  ending = true;
  for (const { child } of children.reverse()) {
    if (!child || hasEnded(child)) continue;
    const gone = new Promise((resolve) => child.once('exit', resolve));
    child.kill('SIGTERM');
    const late = setTimeout(() => child.kill('SIGKILL'), 5000);
    await gone;
    clearTimeout(late);
  }
  if (pidFile) rmSync(pidFile, { force: true });
}
