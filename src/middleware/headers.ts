const HEADERS: Readonly<Record<string, string>> = {
  'x-content-type-options': 'nosniff',
  'x-frame-options': 'DENY',
  'referrer-policy': 'same-origin',
  'cross-origin-opener-policy': 'same-origin',
  'permissions-policy': 'camera=(), microphone=(), geolocation=(), interest-cohort=()',
};

/**
 * What a page may load. Styles stand inline too (widths of bars, dyes of groups); the layout of the Map runs in a
 * worker made from a blob.
 */
const PAGE_POLICY = [
  "default-src 'self'",
  "style-src 'self' 'unsafe-inline'",
  "img-src 'self' data: blob:",
  "font-src 'self' data:",
  "connect-src 'self' blob: data:",
  "worker-src 'self' blob:",
  "object-src 'none'",
  "base-uri 'self'",
  "form-action 'self'",
  "frame-ancestors 'none'",
];

/** Script sources: the hashes that Astro gives for the page's own inline scripts, where it gives them. */
function scriptSources(fromAstro: string | null): string {
  const hashed = fromAstro?.split(';').find((part) => part.trim().startsWith('script-src '));
  return hashed?.trim() ?? "script-src 'self' 'unsafe-inline'";
}

/** Adds the security headers that every answer carries, and keeps pages with data out of caches. */
export function secure(response: Response, url: URL): Response {
  const { headers } = response;
  for (const [name, value] of Object.entries(HEADERS)) headers.set(name, value);
  const type = headers.get('content-type') ?? '';
  if (type.startsWith('text/html')) {
    const scripts = scriptSources(headers.get('content-security-policy'));
    headers.set('content-security-policy', [scripts, ...PAGE_POLICY].join('; '));
    if (!headers.has('cache-control')) headers.set('cache-control', 'no-store');
  } else if (type.includes('json') || type.startsWith('text/csv')) {
    // Data is never a document, whatever a browser is talked into.
    headers.set('content-security-policy', "default-src 'none'; frame-ancestors 'none'");
  }
  if (url.protocol === 'https:')
    headers.set('strict-transport-security', 'max-age=31536000; includeSubDomains');
  return response;
}
