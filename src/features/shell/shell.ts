import type { IconName } from '@/components/ui';

/** Places of the navigation, in order; `settings` and `imports` stand below the line. */
export const PLACES = [
  'brief',
  'map',
  'members',
  'groups',
  'readings',
  'cases',
  'views',
  'imports',
  'settings',
] as const;
export type Place = (typeof PLACES)[number];

export interface NavItem {
  readonly key: Place;
  readonly label: string;
  readonly href: string;
  readonly icon: IconName;
  readonly count?: string;
  /** A count that waits for this person. */
  readonly badge?: number;
  readonly current: boolean;
}

/** Everything the page shell shows around a place. */
export interface ShellData {
  readonly workspace: { id: string; name: string; initials: string };
  readonly person: { name: string; initials: string; email: string };
  readonly community?: { id: string; name: string };
  readonly communities: { id: string; name: string; href: string }[];
  readonly snapshot?: { id: string; label: string; takenOn: string; members: number; ties: number };
  readonly snapshots: { id: string; label: string; takenOn: string; href: string }[];
  readonly nav: NavItem[];
  /** Settings that are this person's to open: the workspace's, or only their own API tokens. */
  readonly settingsHref?: string;
}

/** Address of a place of a community. */
export const placeHref = (
  workspaceId: string,
  communityId: string,
  place: Place,
  snapshotId?: string,
): string =>
  place === 'settings'
    ? `/w/${workspaceId}/settings/people`
    : `/w/${workspaceId}/c/${communityId}/${place}${snapshotId ? `?snapshot=${snapshotId}` : ''}`;

/** Two letters for a name: first letters of the first and the last word. */
export const initials = (name: string): string => {
  const words = name.trim().split(/\s+/);
  const letters = [words[0], words.length > 1 ? words.at(-1) : undefined].map(
    (word) => [...(word ?? '')][0] ?? '',
  );
  return letters.join('').toUpperCase() || '?';
};
