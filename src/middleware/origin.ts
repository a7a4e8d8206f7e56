import { trustedOrigins } from '@/features/account/index.server';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Does another site try to act with this person's cookie, by form or by script? Browsers say where a request
 * comes from; a request without a cookie or with a token of its own carries nothing that could be abused.
 */
export function isForeign(request: Request): boolean {
  const { method, headers } = request;
  if (SAFE.has(method) || !headers.get('cookie') || headers.get('authorization')) return false;
  const origin = headers.get('origin');
  if (origin) return !trustedOrigins(request).includes(origin);
  const site = headers.get('sec-fetch-site');
  return site !== null && site !== 'same-origin' && site !== 'none';
}
