import { collectDefaultMetrics, Gauge, Histogram, register } from 'prom-client';
import { QueryTypes } from 'sequelize';
import { sequelize } from './models';

collectDefaultMetrics({ prefix: 'thrum_' });

const requests = new Histogram({
  name: 'thrum_http_request_seconds',
  help: 'Time to the first byte of an answer, by route pattern',
  labelNames: ['method', 'route', 'status'],
  buckets: [0.01, 0.05, 0.1, 0.25, 0.5, 1, 2.5, 10],
});
const jobs = new Gauge({ name: 'thrum_jobs', help: 'Background jobs by state', labelNames: ['state'] });

/** Notes one answered request; `route` is the pattern, never the address, so that no id becomes a label. */
export function observe(method: string, route: string, status: number, milliseconds: number): void {
  requests.observe({ method, route, status: String(status) }, milliseconds / 1000);
}

/** Prometheus text. */
export async function metricsText(): Promise<string> {
  const rows = await sequelize.query<{ state: string; count: number }>(
    'SELECT state, count(*)::int AS count FROM jobs GROUP BY state',
    { type: QueryTypes.SELECT },
  );
  for (const { state, count } of rows) jobs.set({ state }, count);
  return register.metrics();
}
