/** Plain guesses about columns, from their names alone; a person can correct each. */

const words = (header: string): string =>
  header
    .trim()
    .toLowerCase()
    .normalize('NFKD')
    .replaceAll(/[^\p{L}\p{N}]+/gu, '_')
    .replaceAll(/^_+|_+$/g, '');

const SOURCE = [
  'source',
  'from',
  'src',
  'member_a',
  'a',
  'sender',
  'giver',
  'author',
  'node1',
  'id1',
  'member1',
  'from_id',
  'source_id',
];
const TARGET = [
  'target',
  'to',
  'dst',
  'member_b',
  'b',
  'receiver',
  'recipient',
  'node2',
  'id2',
  'member2',
  'to_id',
  'target_id',
];
const WEIGHT = ['weight', 'strength', 'w', 'count', 'times', 'n', 'contacts', 'value'];
const KIND = ['kind', 'type', 'tie', 'relation', 'channel'];
const TIME = ['time', 'date', 'at', 'last', 'last_contact', 'timestamp', 'when', 'last_date', 'last_on'];
const ID = [
  'id',
  'member',
  'member_id',
  'handle',
  'user',
  'user_id',
  'username',
  'node',
  'external_id',
  'name_id',
];
const NAME = ['name', 'display_name', 'full_name', 'label', 'nickname', 'screen_name'];

const find = (
  headers: readonly string[],
  names: readonly string[],
  taken: ReadonlySet<string>,
): string | undefined => {
  for (const name of names) {
    const hit = headers.find((header) => words(header) === name && !taken.has(header));
    if (hit !== undefined) return hit;
  }
  return undefined;
};

export interface TieColumns {
  source?: string | undefined;
  target?: string | undefined;
  weight?: string | undefined;
  kind?: string | undefined;
  time?: string | undefined;
}

/** Columns of a ties file. Two columns with unknown names are taken as source and target. */
export function guessTieColumns(headers: readonly string[]): TieColumns {
  const taken = new Set<string>();
  const pick = (names: readonly string[]): string | undefined => {
    const hit = find(headers, names, taken);
    if (hit !== undefined) taken.add(hit);
    return hit;
  };
  let source = pick(SOURCE);
  let target = pick(TARGET);
  if (source === undefined && target === undefined && headers.length === 2) [source, target] = headers;
  return { source, target, weight: pick(WEIGHT), kind: pick(KIND), time: pick(TIME) };
}

export interface MemberColumns {
  id?: string | undefined;
  name?: string | undefined;
  /** Every other column, as an attribute under a readable name. */
  attributes: { column: string; name: string }[];
}

/** "complaints_per_100" → "Complaints per 100". */
export const readable = (header: string): string => {
  const text = header.trim().replaceAll(/[_\s]+/g, ' ');
  return text.charAt(0).toUpperCase() + text.slice(1);
};

/** Columns of a members file. Without a known name, the first column is the id. */
export function guessMemberColumns(headers: readonly string[]): MemberColumns {
  const id = find(headers, ID, new Set()) ?? headers[0];
  const taken = new Set(id === undefined ? [] : [id]);
  const name = find(headers, NAME, taken);
  if (name !== undefined) taken.add(name);
  return {
    id,
    name,
    attributes: headers
      .filter((header) => header.trim() !== '' && !taken.has(header))
      .map((column) => ({ column, name: column.trim() })),
  };
}

/** What a file is for, from its header. */
export function guessRole(headers: readonly string[]): 'ties' | 'members' | 'mapping' {
  const names = new Set(headers.map(words));
  if (
    headers.length === 2 &&
    (names.has('old') || names.has('old_id')) &&
    (names.has('new') || names.has('new_id'))
  )
    return 'mapping';
  const { source, target } = guessTieColumns(headers);
  return source !== undefined && target !== undefined ? 'ties' : 'members';
}

const OLD = ['old', 'old_id', 'from', 'before', 'previous', 'was'];
const NEW = ['new', 'new_id', 'to', 'after', 'now', 'is'];

/** Columns of a file of changed ids. */
export function guessMappingColumns(headers: readonly string[]): {
  old?: string | undefined;
  new?: string | undefined;
} {
  const old = find(headers, OLD, new Set());
  const now = find(headers, NEW, new Set(old === undefined ? [] : [old]));
  if (old === undefined && now === undefined && headers.length === 2)
    return { old: headers[0], new: headers[1] };
  return { old, new: now };
}
