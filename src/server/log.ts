import { pino } from 'pino';

/** Structured log; messages carry ids, never names, scores or secrets. */
export const log = pino({
  level: process.env.LOG_LEVEL ?? 'info',
  base: null,
  redact: ['req.headers.authorization', 'req.headers.cookie', 'password', 'token'],
});
