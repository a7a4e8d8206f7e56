/** Thrum's own icons on a 20 px grid, as path data; circles are [cx, cy, r]. Drawn by ui/Icon and brand/Icon.astro. */

export interface IconShape {
  paths: readonly string[];
  circles?: readonly (readonly [number, number, number])[];
  /** A last path drawn with a dash, where the picture is of a seam. */
  dashed?: readonly [path: string, dash: string];
}

const shape = (paths: string[], circles?: IconShape['circles'], dashed?: IconShape['dashed']): IconShape => ({
  paths,
  ...(circles && { circles }),
  ...(dashed && { dashed }),
});

export const ICONS = {
  brief: shape(['M4 3.5h9l3 3v10H4z', 'M7 8h6M7 11h6M7 14h3.5']),
  map: shape(
    ['M7.2 5.8l6-.6M6.4 7.8l4.7 5.2M14.6 6.8l-1.4 5.8'],
    [
      [5, 6, 2.2],
      [15, 5, 1.8],
      [12.5, 15, 2.4],
    ],
  ),
  members: shape(
    ['M2.5 16.5c.3-3.2 2.2-5 5-5s4.7 1.8 5 5', 'M12.5 4.6a2.6 2.6 0 010 4.9M14.5 12c1.8.6 2.9 2.1 3.1 4.5'],
    [[7.5, 7, 2.8]],
  ),
  groups: shape(['M3.5 3.5h6v13h-6zM12.5 3.5h4v5h-4zM12.5 11.5h4v5h-4z'], undefined, ['M11 3v14', '1.6 2.2']),
  readings: shape(['M3 3.5h14', 'M4.5 3.5v13M8.2 3.5v9.5M11.8 3.5v6M15.5 3.5v3.5']),
  cases: shape(['M3.5 6.5h13v10h-13zM7.5 6.5v-3h5v3', 'M7 11.5h6']),
  introductions: shape(
    ['M10 3v2M10 15v2'],
    [
      [6, 10, 3.2],
      [14, 10, 3.2],
    ],
    ['M9.2 10h1.6', '1 1'],
  ),
  soundings: shape([
    'M10 2.5v8',
    'M10 10.5l2.2 3.6a2.6 2.6 0 11-4.4 0z',
    'M3 6.5c2-1.4 3.5-1.4 5 0M12 6.5c1.5-1.4 3-1.4 5 0',
  ]),
  imports: shape(['M10 3v8.5M6.8 8.5L10 11.7l3.2-3.2', 'M3.5 12.5v4h13v-4']),
  settings: shape(
    ['M3 6h7M14 6h3M3 14h3M10 14h7'],
    [
      [12, 6, 2],
      [8, 14, 2],
    ],
  ),
  changes: shape(['M3 14.5l4-5 3.5 2.5 6-7', 'M12.5 5h4v4']),
  check: shape(['M4 10.5l4 4 8-9']),
  minus: shape(['M4 10h12']),
  plus: shape(['M10 4v12M4 10h12']),
  close: shape(['M5 5l10 10M15 5L5 15']),
  'chevron-down': shape(['M5.5 8l4.5 4.5L14.5 8']),
  'chevron-up': shape(['M5.5 12.5L10 8l4.5 4.5']),
  'chevron-left': shape(['M12 5.5L7.5 10l4.5 4.5']),
  'chevron-right': shape(['M8 5.5l4.5 4.5L8 14.5']),
  'arrow-right': shape(['M4 10h12M11.5 5.5L16 10l-4.5 4.5']),
  'arrow-left': shape(['M16 10H4M8.5 5.5L4 10l4.5 4.5']),
  search: shape(['M13 13l4 4'], [[9, 9, 5]]),
  help: shape(['M7.9 8a2.2 2.2 0 114 1.3c-.8.8-1.7 1.1-1.7 2.3M10.2 14v.1'], [[10, 10, 7]]),
  info: shape(['M10 9v5M10 6.3v.1'], [[10, 10, 7]]),
  warning: shape(['M10 3.2L17.5 16.5h-15z', 'M10 8v4.2M10 14.4v.1']),
  more: shape(
    [],
    [
      [4.5, 10, 0.8],
      [10, 10, 0.8],
      [15.5, 10, 0.8],
    ],
  ),
  bookmark: shape(['M5.5 3.5h9v13L10 13l-4.5 3.5z']),
  pin: shape(['M7 3.5h6l-1 5 2.5 3h-9L8 8.5zM10 11.5v5']),
  fit: shape(['M3.5 7.5v-4h4M12.5 3.5h4v4M16.5 12.5v4h-4M7.5 16.5h-4v-4']),
  eye: shape(['M2.5 10c2-3.6 4.5-5 7.5-5s5.5 1.4 7.5 5c-2 3.6-4.5 5-7.5 5s-5.5-1.4-7.5-5z'], [[10, 10, 2.3]]),
  hidden: shape([
    'M3 3l14 14M5.5 6.5C4.3 7.4 3.3 8.6 2.5 10c2 3.6 4.5 5 7.5 5 1.2 0 2.3-.2 3.3-.7M8.5 5.1c.5-.1 1-.1 1.5-.1 3 0 5.5 1.4 7.5 5-.4.8-.9 1.4-1.4 2',
  ]),
  lock: shape(['M4.5 9h11v7.5h-11zM7 9V6.5a3 3 0 016 0V9']),
  key: shape(['M9.5 10h7.5v3M14 10v2.5'], [[6.5, 10, 3]]),
  share: shape(
    ['M7.3 9l5.4-3M7.3 11l5.4 3'],
    [
      [5.5, 10, 2],
      [14.5, 5, 2],
      [14.5, 15, 2],
    ],
  ),
  undo: shape(['M7 5L3.5 8.5 7 12M3.5 8.5H12a4 4 0 010 8h-2']),
  refresh: shape(['M16 8A6.3 6.3 0 004.5 7M4 12a6.3 6.3 0 0011.5 1', 'M4.3 3.5V7H8M15.7 16.5V13H12']),
  download: shape(['M10 3v9M6.5 9l3.5 3.5L13.5 9M4 16.5h12']),
  columns: shape(['M3.5 4h13v12h-13zM8 4v12M12.3 4v12']),
  list: shape(['M7 5h10M7 10h10M7 15h10M3.5 5v.1M3.5 10v.1M3.5 15v.1']),
  filter: shape(['M3 5h14M6 10h8M8.5 15h3']),
  file: shape(['M5 2.5h7l3.5 3.5v11.5H5z', 'M12 2.5V6h3.5']),
  mail: shape(['M3 5h14v10H3z', 'M3 6l7 5 7-5']),
  note: shape(['M3.5 3.5h13v9l-4 4h-9z', 'M16.5 12.5h-4v4']),
  offline: shape([
    'M3 3l14 14M5 8.5c1.4-1.2 3-1.8 5-1.8M15.5 9a8 8 0 00-2.8-1.7M8 12.3a3.5 3.5 0 014 0M10 15.5v.1',
  ]),
  moon: shape(['M15.5 12.2A6.3 6.3 0 018 4.2a6.3 6.3 0 107.5 8z']),
  sun: shape(
    [
      'M10 2.5v2M10 15.5v2M2.5 10h2M15.5 10h2M4.7 4.7l1.4 1.4M13.9 13.9l1.4 1.4M4.7 15.3l1.4-1.4M13.9 6.1l1.4-1.4',
    ],
    [[10, 10, 3.2]],
  ),
  'sign-out': shape(['M8 3.5H4v13h4M8.5 10H17M13.5 6.5L17 10l-3.5 3.5']),
  trash: shape(['M4 6h12M8 6V3.5h4V6M5.5 6l.7 10.5h7.6L14.5 6']),
  play: shape(['M6.5 4.5v11l9-5.5z']),
  pause: shape(['M7 4.5v11M13 4.5v11']),
  spinner: shape(['M10 3a7 7 0 107 7']),
} satisfies Record<string, IconShape>;

export type IconName = keyof typeof ICONS;
