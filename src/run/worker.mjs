import { requireProduction } from './production.mjs';

requireProduction();
await import('../../dist/worker/worker.mjs');
