import type { ImportLimits, ImportOptions } from '../../imports';
import { rememberedChoices, usualChoices, type Choices } from './choices';
import { reread, type LoadedFile, type Role } from './load-file';
import {
  matchMapping,
  matchMembers,
  matchTies,
  type MappingMatch,
  type MemberMatch,
  type TieMatch,
  type Whys,
} from './match';
import { profilesOf, type Profile } from './profile';

type Side = 'ties' | 'members' | 'mapping';

/** A new import as it stands on the page. */
export interface Draft {
  readonly files: readonly LoadedFile[];
  readonly ties: TieMatch;
  readonly members: MemberMatch;
  readonly mapping: MappingMatch;
  readonly whys: Readonly<Record<Side, Whys>>;
  readonly choices: Choices;
  /** What the matching began with: an earlier import or a recipe. */
  readonly remembered: ImportOptions | null;
}

export const emptyDraft = (takenOn: string, remembered: ImportOptions | null): Draft => ({
  files: [],
  ties: {},
  members: { id: null, name: null, attributes: [] },
  mapping: {},
  whys: { ties: {}, members: {}, mapping: {} },
  choices: remembered ? rememberedChoices(remembered, usualChoices(takenOn)) : usualChoices(takenOn),
  remembered,
});

export const fileOf = (draft: Draft, side: Side): LoadedFile | undefined =>
  draft.files.find((one) => one.role === side) ??
  (side === 'mapping' ? undefined : draft.files.find((one) => one.role === 'graph'));

/** The table of a side: of its own file, or of the graph file that holds both. */
export function tableOf(draft: Draft, side: Side) {
  const file = fileOf(draft, side);
  if (!file?.sample) return null;
  return side === 'members' && file.role === 'graph' ? file.sample.members : file.sample.table;
}

export const profilesFor = (draft: Draft, side: Side): Profile[] => {
  const table = tableOf(draft, side);
  return table ? profilesOf(table) : [];
};

/** Matches the columns anew, as after other files, settings or recipes. */
export function rematch(draft: Draft): Draft {
  const { remembered } = draft;
  const ties = matchTies(profilesFor(draft, 'ties'), remembered?.ties);
  const members = matchMembers(profilesFor(draft, 'members'), remembered?.members);
  const mapping = matchMapping(profilesFor(draft, 'mapping'));
  return {
    ...draft,
    ties: ties.match,
    members: members.match,
    mapping: mapping.match,
    whys: { ties: ties.whys, members: members.whys, mapping: mapping.whys },
  };
}

/** One file a role: the latest wins, the one before is set aside. */
export function addFiles(draft: Draft, added: readonly LoadedFile[]): Draft {
  const files: LoadedFile[] = [...draft.files];
  for (const one of added) {
    const rivals = files.map((other) =>
      conflicts(other.role, one.role) ? { ...other, role: 'none' as const } : other,
    );
    files.splice(0, files.length, ...rivals, one);
  }
  return rematch({ ...draft, files });
}

const conflicts = (a: Role, b: Role): boolean =>
  a !== 'none' && (a === b || (a === 'graph' && b === 'ties') || (a === 'ties' && b === 'graph'));

/** Gives a file another role; the file that had it gets the first one's, so that two can be swapped. */
export function setRole(draft: Draft, key: string, role: Role): Draft {
  const before = draft.files.find((one) => one.key === key)!.role;
  const files = draft.files.map((one) => {
    if (one.key === key) return { ...one, role };
    return conflicts(one.role, role) ? { ...one, role: before } : one;
  });
  return rematch({ ...draft, files });
}

export const removeFile = (draft: Draft, key: string): Draft =>
  rematch({ ...draft, files: draft.files.filter((one) => one.key !== key) });

export const setSettings = (
  draft: Draft,
  key: string,
  settings: LoadedFile['settings'],
  limits: ImportLimits,
): Draft =>
  rematch({
    ...draft,
    files: draft.files.map((one) => (one.key === key ? reread(one, settings, limits) : one)),
  });

/** Another recipe, or none: columns and choices begin anew from it. */
export const useRecipe = (draft: Draft, options: ImportOptions | null): Draft =>
  rematch({
    ...draft,
    remembered: options,
    choices: options
      ? rememberedChoices(options, draft.choices)
      : { ...usualChoices(draft.choices.takenOn), label: draft.choices.label, mode: draft.choices.mode },
  });
