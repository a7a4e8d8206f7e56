import type { ImportOptions } from '../../imports';
import { fileOf, profilesFor, type Draft } from './draft';
import type { MemberMatch } from './match';

/** Leaves out what is blank: the server then detects, or takes its default. */
function given<T extends object>(values: T): { [K in keyof T]?: Exclude<T[K], null | undefined> } {
  return Object.fromEntries(
    Object.entries(values).filter(([, value]) => value !== null && value !== undefined && value !== ''),
  ) as never;
}

function membersOf({ id, name, attributes }: MemberMatch): ImportOptions['members'] {
  return {
    ...given({ id, name }),
    attributes: attributes.map((one) => ({
      column: one.column,
      name: one.name.trim() || one.column,
      type: one.as,
      direction: one.direction,
      sensitive: one.sensitive,
      ...given({ countColumn: one.countColumn, least: one.least, most: one.most }),
    })),
  };
}

/** Dates of a side as its columns are written, where nobody has set their form. */
function readingOf(draft: Draft, side: 'ties' | 'members' | 'mapping') {
  const settings = fileOf(draft, side)?.settings ?? {};
  const dated =
    side === 'ties'
      ? [draft.ties.time]
      : draft.members.attributes.filter((one) => one.as === 'date').map((one) => one.column);
  const dates = profilesFor(draft, side).find((one) => one.dates && dated.includes(one.column))?.dates;
  return { ...(dates ? { dates } : {}), ...settings };
}

/** The options that are sent, and kept as a recipe. */
export function toOptions(draft: Draft): Partial<ImportOptions> {
  const { choices } = draft;
  const hasMembers = profilesFor(draft, 'members').length > 0;
  return {
    accept: 'review',
    takenOn: choices.takenOn,
    ...given({ label: choices.label.trim() }),
    mode: choices.mode,
    directions: choices.directions,
    repeats: choices.repeats,
    logWeight: choices.logWeight,
    halfLifeDays: choices.halfLifeDays,
    minimumWeight: choices.minimumWeight,
    loners: choices.loners,
    ties: given(draft.ties),
    ...(hasMembers ? { members: membersOf(draft.members) } : {}),
    ...(fileOf(draft, 'mapping') ? { mapping: given(draft.mapping) } : {}),
    reading: {
      ties: readingOf(draft, 'ties'),
      ...(hasMembers ? { members: readingOf(draft, 'members') } : {}),
      ...(fileOf(draft, 'mapping') ? { mapping: fileOf(draft, 'mapping')!.settings } : {}),
    },
  };
}
