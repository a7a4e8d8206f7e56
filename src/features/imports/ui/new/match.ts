import type { AttributeOption, ImportOptions } from '../../imports';
import { guessMappingColumns, guessMemberColumns, guessTieColumns } from '../../guess';
import type { Profile } from './profile';

export type TieField = 'source' | 'target' | 'weight' | 'kind' | 'time';
export type MappingField = 'old' | 'new';
export type As = 'number' | 'label' | 'date';

export interface AttributeMatch {
  readonly column: string;
  readonly name: string;
  readonly as: As;
  readonly direction: AttributeOption['direction'];
  readonly sensitive: boolean;
  readonly countColumn: string | null;
  readonly least: number | null;
  readonly most: number | null;
}

export interface MemberMatch {
  readonly id: string | null;
  readonly name: string | null;
  readonly attributes: readonly AttributeMatch[];
}
export type TieMatch = Partial<Record<TieField, string>>;
export type MappingMatch = Partial<Record<MappingField, string>>;

/** Why a column became what it became, shown beside it. */
export interface Why {
  readonly tone: 'moss' | 'weld' | 'plain';
  readonly text: string;
}
export type Whys = Readonly<Record<string, Why>>;

const REMEMBERED: Why = { tone: 'moss', text: 'remembered' };
const BY_NAME: Why = { tone: 'moss', text: 'matched by name' };
const CHECK: Why = { tone: 'weld', text: 'please check' };

/** Fields by the choices remembered, where those columns are there, else by their names. */
function fields<F extends string>(
  profiles: readonly Profile[],
  guess: Partial<Record<F, string | undefined>>,
  remembered: Partial<Record<F, string | undefined>> | undefined,
  order: readonly F[],
): { match: Partial<Record<F, string>>; whys: Whys } {
  const columns = new Set(profiles.map((one) => one.column));
  const match: Partial<Record<F, string>> = {};
  const whys: Record<string, Why> = {};
  for (const field of order) {
    const before = remembered?.[field];
    const column = before !== undefined && columns.has(before) ? before : guess[field];
    if (column === undefined || whys[column]) continue;
    match[field] = column;
    whys[column] = column === before ? REMEMBERED : BY_NAME;
  }
  for (const { column } of profiles) whys[column] ??= { tone: 'plain', text: 'not used' };
  return { match, whys };
}

export const TIE_FIELDS: readonly TieField[] = ['source', 'target', 'weight', 'kind', 'time'];

export function matchTies(
  profiles: readonly Profile[],
  remembered?: ImportOptions['ties'],
): { match: TieMatch; whys: Whys } {
  return fields(profiles, guessTieColumns(profiles.map((one) => one.column)), remembered, TIE_FIELDS);
}

export const matchMapping = (profiles: readonly Profile[]): { match: MappingMatch; whys: Whys } =>
  fields(profiles, guessMappingColumns(profiles.map((one) => one.column)), undefined, ['old', 'new']);

const blankWords = (blank: number): string => `${Math.round(blank * 100)} % blank, kept`;

/** What a column looks like, where nothing was remembered of it. */
function attributeOf(profile: Profile, name: string): { match: AttributeMatch | null; why: Why } {
  const { column, blank, numbers, dates, freeText } = profile;
  const match = (as: As): AttributeMatch => ({
    column,
    name,
    as,
    direction: 'neither',
    sensitive: false,
    countColumn: null,
    least: null,
    most: null,
  });
  if (blank === 1) return { match: null, why: { tone: 'plain', text: 'blank' } };
  if (dates) return { match: match('date'), why: { tone: 'moss', text: 'from dates' } };
  if (numbers >= 0.95)
    return {
      match: match('number'),
      why:
        numbers < 1
          ? { tone: 'weld', text: 'some cells are no numbers' }
          : { tone: 'moss', text: blank > 0.05 ? blankWords(blank) : 'numbers' },
    };
  if (freeText) return { match: null, why: { tone: 'plain', text: 'free text' } };
  if (numbers > 0.5) return { match: match('label'), why: CHECK };
  return { match: match('label'), why: { tone: 'moss', text: blank > 0.05 ? blankWords(blank) : 'labels' } };
}

const rememberedMatch = (before: AttributeOption, as: As): AttributeMatch => ({
  column: before.column,
  name: before.name,
  as: before.type ?? as,
  direction: before.direction,
  sensitive: before.sensitive,
  countColumn: before.countColumn ?? null,
  least: before.least ?? null,
  most: before.most ?? null,
});

export function matchMembers(
  profiles: readonly Profile[],
  remembered?: ImportOptions['members'],
): { match: MemberMatch; whys: Whys } {
  const headers = profiles.map((one) => one.column);
  const guess = guessMemberColumns(headers);
  const { match, whys } = fields(profiles, { id: guess.id, name: guess.name }, remembered, ['id', 'name']);
  const reasons: Record<string, Why> = { ...whys };
  const before = new Map(remembered?.attributes?.map((one) => [one.column, one]));
  const attributes: AttributeMatch[] = [];
  for (const profile of profiles) {
    const { column } = profile;
    if (column === '' || column === match.id || column === match.name) continue;
    const known = before.get(column);
    const fresh = attributeOf(profile, known?.name ?? column);
    if (known) attributes.push(rememberedMatch(known, fresh.match?.as ?? 'number'));
    else if (fresh.match && !(remembered?.attributes && before.size > 0)) attributes.push(fresh.match);
    reasons[column] = known ? REMEMBERED : before.size > 0 ? { tone: 'weld', text: 'new column' } : fresh.why;
  }
  return { match: { id: match.id ?? null, name: match.name ?? null, attributes }, whys: reasons };
}
