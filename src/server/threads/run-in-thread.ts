import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { Worker } from 'node:worker_threads';
import { ProblemError } from '@/lib/problem';
import type { ThreadMessage, ThreadRequest } from './protocol';

/** The bundle of src/thread.ts; found from the project root, since import.meta.url moves when bundled. */
const entry = (): string => process.env.THRUM_THREAD_ENTRY ?? join(process.cwd(), 'dist/worker/thread.mjs');

/** Most memory of one thread's heap; typed arrays live outside it. */
const HEAP_MB = 1_024;

/**
 * Runs one registered task in a thread of its own and returns its result (structured clone; buffers move).
 * @param task a key of the registry in src/thread.ts
 * @throws ProblemError 422 when the method cannot answer for this input, AbortError when stopped
 */
export function runInThread<Result>(
  task: string,
  input: unknown,
  watch: { progress?: (done: number, step: string) => void; signal?: AbortSignal } = {},
): Promise<Result> {
  const path = entry();
  if (!existsSync(path)) throw new Error('The thread bundle is missing; run npm run build first.');
  const stop = new SharedArrayBuffer(4);
  const request: ThreadRequest = { task, input, stop };
  return new Promise<Result>((resolve, reject) => {
    const worker = new Worker(path, {
      workerData: request,
      resourceLimits: { maxOldGenerationSizeMb: HEAP_MB },
    });
    let settled = false;
    const finish = (act: () => void): void => {
      if (settled) return;
      settled = true;
      watch.signal?.removeEventListener('abort', onAbort);
      void worker.terminate();
      act();
    };
    const aborted = (): Error => Object.assign(new Error('Stopped.'), { name: 'AbortError' });
    // A polite stop first; a computation that does not listen is ended.
    const onAbort = (): void => {
      Atomics.store(new Int32Array(stop), 0, 1);
      setTimeout(() => finish(() => reject(aborted())), 500).unref();
    };
    if (watch.signal?.aborted) onAbort();
    watch.signal?.addEventListener('abort', onAbort);
    worker.on('message', (message: ThreadMessage) => {
      if (message.kind === 'progress') watch.progress?.(message.done, message.step);
      else if (message.kind === 'result') finish(() => resolve(message.value as Result));
      else if (message.name === 'CancelledError') finish(() => reject(aborted()));
      else if (message.code !== null)
        finish(() =>
          reject(new ProblemError(422, message.code!, 'This cannot be computed.', message.message)),
        );
      else finish(() => reject(new Error(`${message.name}: ${message.message}`)));
    });
    worker.on('error', (error) => finish(() => reject(error)));
    worker.on('exit', (code) => finish(() => reject(new Error(`A computing thread ended early (${code}).`))));
  });
}
