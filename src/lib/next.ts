/** Where to go after signing in: only a path of this site, never another address. */
export function safeNext(text: string | null | undefined, otherwise = '/'): string {
  if (!text?.startsWith('/') || text.startsWith('//') || text.startsWith('/\\')) return otherwise;
  try {
    const url = new URL(text, 'http://site.invalid');
    return url.host === 'site.invalid' ? url.pathname + url.search + url.hash : otherwise;
  } catch {
    return otherwise;
  }
}
