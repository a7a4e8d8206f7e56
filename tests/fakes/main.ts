import { startFakes } from './index';

/** The fakes as a process: prints its variables as one line of JSON when they listen, ends on a signal. */
const fakes = await startFakes({ dataDir: process.env.DATA_DIR ?? '.data' });
process.stdout.write(`${JSON.stringify(fakes.env)}\n`);
const end = (): void => void fakes.stop().then(() => process.exit(0));
process.on('SIGINT', end);
process.on('SIGTERM', end);
