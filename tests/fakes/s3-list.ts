import { existsSync, readdirSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { escapeXml } from './s3-answers';

/** Every finished file under a folder, as keys. */
function keysUnder(folder: string, prefix = ''): string[] {
  if (!existsSync(folder)) return [];
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    if (entry.isDirectory()) return keysUnder(join(folder, entry.name), `${prefix}${entry.name}/`);
    return entry.name.endsWith('.partial') ? [] : [`${prefix}${entry.name}`];
  });
}

/** The answer to ListObjectsV2: keys in order, `max-keys` at a time, the last key of a page as its token. */
export function listObjects(folder: string, query: URLSearchParams): string {
  const prefix = query.get('prefix') ?? '';
  const after = query.get('continuation-token') ?? query.get('start-after') ?? '';
  const most = Math.min(Number(query.get('max-keys') ?? 1000), 1000);
  const left = keysUnder(folder)
    .filter((key) => key.startsWith(prefix) && key > after)
    .sort();
  const page = left.slice(0, most);
  const more = left.length > page.length;
  const items = page.map((key) => {
    const { mtime, size } = statSync(join(folder, key));
    return `<Contents><Key>${escapeXml(key)}</Key><LastModified>${mtime.toISOString()}</LastModified><Size>${size}</Size></Contents>`;
  });
  const next = more ? `<NextContinuationToken>${escapeXml(page.at(-1) ?? '')}</NextContinuationToken>` : '';
  return `<ListBucketResult><KeyCount>${items.length}</KeyCount><IsTruncated>${more}</IsTruncated>${next}${items.join('')}</ListBucketResult>`;
}
