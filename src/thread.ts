import { parentPort, workerData } from 'node:worker_threads';
import type { ThreadMessage, ThreadRequest, ThreadTask } from './server/threads/protocol';

/** Every task that a computing thread knows, loaded when asked for. */
const tasks: Readonly<Record<string, () => Promise<ThreadTask>>> = {
  spectrum: async () => (await import('./features/network/compute')).computeSpectrum,
  shape: async () => (await import('./features/network/compute')).computeShape,
  grouping: async () => (await import('./features/groupings/compute')).computeGrouping,
  'smoother-groups': async () => (await import('./features/groupings/compute')).computeSmootherGroups,
  reading: async () => (await import('./features/readings/compute')).computeReading,
};

const { task, input, stop } = workerData as ThreadRequest;
const flag = new Int32Array(stop);
const send = (message: ThreadMessage): void => parentPort?.postMessage(message);

let reported = 0;
try {
  const load = tasks[task];
  if (!load) throw new Error(`unknown task ${task}`);
  const run = await load();
  const value = await run(input as never, {
    progress: (done, step) => {
      const now = Date.now();
      if (now - reported < 100 && done < 1) return;
      reported = now;
      send({ kind: 'progress', done, step });
    },
    cancelled: () => Atomics.load(flag, 0) === 1,
  });
  send({ kind: 'result', value });
} catch (error) {
  const { name, message, code } = error as Error & { code?: string };
  const known = name === 'UnanswerableError' || name === 'NotConvergedError';
  send({ kind: 'error', name, message, code: known ? (code ?? 'not-converged') : null });
}
