import { describe, expect, test } from 'vitest';
import { safeNext } from '@/lib/next';
import { secure } from '@/middleware/headers';

const policyOf = (type: string, policy?: string): string =>
  secure(
    new Response('', {
      headers: { 'content-type': type, ...(policy ? { 'content-security-policy': policy } : {}) },
    }),
    new URL('http://thrum.test/'),
  ).headers.get('content-security-policy') ?? '';

describe('security headers', () => {
  test('a page keeps the hashes of its own inline scripts and allows no others', () => {
    const policy = policyOf('text/html', "script-src 'self' 'sha256-abc='; style-src 'self' 'sha256-def=';");
    const directives = policy.split('; ');
    expect(directives.filter((one) => one.startsWith('script-src'))).toEqual([
      "script-src 'self' 'sha256-abc='",
    ]);
    expect(directives.filter((one) => one.startsWith('style-src'))).toEqual([
      "style-src 'self' 'unsafe-inline'",
    ]);
    for (const closed of [
      "object-src 'none'",
      "frame-ancestors 'none'",
      "base-uri 'self'",
      "default-src 'self'",
    ])
      expect(directives).toContain(closed);
  });

  test('pages are not cached; data is never a document', () => {
    const page = secure(
      new Response('', { headers: { 'content-type': 'text/html' } }),
      new URL('https://thrum.test/'),
    );
    expect(page.headers.get('cache-control')).toBe('no-store');
    expect(page.headers.get('strict-transport-security')).toContain('max-age=');
    expect(policyOf('application/json')).toContain("default-src 'none'");
  });
});

describe('where signing in leads', () => {
  test.each([
    ['/w/abc?x=1#y', '/w/abc?x=1#y'],
    ['//evil.example', '/'],
    ['/\\evil.example', '/'],
    ['https://evil.example', '/'],
    ['javascript:alert(1)', '/'],
    ['/\t/evil.example', '/'],
    [null, '/'],
  ])('%s → %s', (given, led) => {
    expect(safeNext(given)).toBe(led);
  });
});
