import { registry } from '@/jobs';
import { config } from '@/server/config';
import { log } from '@/server/log';
import { startWorker } from '@/server/queue';
import { ensureBucket } from '@/server/storage';

config();
await ensureBucket();
const worker = await startWorker(registry);
log.info('worker is ready');

let ending = false;
const end = async (code: number): Promise<void> => {
  if (ending) return;
  ending = true;
  await worker.stop().catch(() => undefined);
  process.exit(code);
};
process.on('SIGINT', () => void end(0));
process.on('SIGTERM', () => void end(0));
// The queue's own connections fail outside any job while the database is away: say so, end, and start afresh.
process.on('uncaughtException', (err) => {
  log.error({ err: err.message }, 'worker stopped; jobs go on when it is started again');
  void end(1);
});
// The queue gave up, as when the database stays away: end, and let the supervisor start afresh.
worker.done.then(
  () => void end(ending ? 0 : 1),
  (err: unknown) => {
    log.error({ err }, 'worker stopped');
    void end(1);
  },
);
