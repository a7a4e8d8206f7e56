const HEADERS: Readonly<Record<string, string>> = {
  'x-content-type-options': 'nosniff',
  'x-frame-options': 'DENY',
  'referrer-policy': 'same-origin',
  'cross-origin-opener-policy': 'same-origin',
  'permissions-policy': 'camera=(), microphone=(), geolocation=(), interest-cohort=()',
};

/** Adds the security headers that every answer carries, and keeps pages with data out of caches. */
export function secure(response: Response, url: URL): Response {
  for (const [name, value] of Object.entries(HEADERS)) response.headers.set(name, value);
  const type = response.headers.get('content-type') ?? '';
  if (type.startsWith('text/html') && !response.headers.has('cache-control'))
    response.headers.set('cache-control', 'no-store');
  if (url.protocol === 'https:')
    response.headers.set('strict-transport-security', 'max-age=31536000; includeSubDomains');
  return response;
}
