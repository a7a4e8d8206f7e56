import { startWorker } from '@/server/queue';

/** A worker whose only job counts slowly; started as a process of its own so that a test can kill it. */
const STEPS = 16;

const worker = await startWorker({
  count: {
    load: () =>
      Promise.resolve(async ({ progress, signal, targetId }) => {
        for (let step = 0; step < STEPS; step++) {
          progress(step / STEPS, `Step ${step + 1} of ${STEPS}`);
          await new Promise((resolve) => setTimeout(resolve, 250));
          if (signal.aborted) throw new Error('stopped');
        }
        return { kind: 'count', id: targetId, href: '/' };
      }),
  },
});
process.stdout.write('ready\n');
await worker.done;
