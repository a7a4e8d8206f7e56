import type { Cells } from './attributes';
import type { ContactRow } from './tie-rows';
import { rowAt } from './tie-rows';

export const TIES_HEADER = 'source,target,kind,count,last_date';
export const MEMBERS_HEADER =
  'member,display_name,helpfulness,complaints_per_100,belonging,posts_per_week,months_since_joining,circle';

/** "quiet-fern" → "Quiet Fern". */
export const displayName = (handle: string): string =>
  handle
    .split('-')
    .map((word) => word.charAt(0).toUpperCase() + word.slice(1))
    .join(' ');

/** Lines in the order of their code points: the same in every locale. */
const ordered = (lines: string[]): string[] => lines.sort((a, b) => (a < b ? -1 : a > b ? 1 : 0));

const file = (header: string, lines: string[]): string => `${[header, ...ordered(lines)].join('\n')}\n`;

export const membersCsv = (cells: ReadonlyMap<number, Cells>, handles: readonly string[]): string =>
  file(
    MEMBERS_HEADER,
    [...cells].map(([i, one]) =>
      [
        handles[i]!,
        displayName(handles[i]!),
        one.helpfulness,
        one.complaints,
        one.belonging,
        one.posts,
        one.months,
        one.circle,
      ].join(','),
    ),
  );

export const tiesCsv = (rows: readonly ContactRow[], snapshot: number, handles: readonly string[]): string =>
  file(
    TIES_HEADER,
    rows
      .filter(({ tie }) => tie.formed <= snapshot && snapshot < tie.ended)
      .map((row) => {
        const { count, lastDate } = rowAt(row, snapshot);
        return [handles[row.source]!, handles[row.target]!, row.kind, String(count), lastDate].join(',');
      }),
  );
