import type { IconName } from '@/components/brand/icons';

/** One place in the navigation; the feature code makes the list, the layout only draws it. */
export interface NavItem {
  key: string;
  label: string;
  href: string;
  icon: IconName;
  /** A quiet number beside the word, such as 1,264. */
  count?: string | number;
  /** A number that wants attention, on madder. */
  badge?: number;
  current?: boolean;
  /** A line above this item. Default: above the place with key `imports`. */
  gap?: boolean;
  /** One of the four tabs at the foot of a phone. Default: brief, map, members, cases. */
  tab?: boolean;
}

export interface ShellWorkspace {
  id: string;
  name: string;
  initials: string;
  href?: string;
}

export interface ShellPerson {
  name: string;
  initials: string;
  email: string;
  role?: string;
}

export interface ShellChoice {
  id: string;
  label: string;
  href: string;
}

export interface ShellSnapshot {
  id: string;
  label: string;
  takenOn: string;
  ties: number;
}

const TABS = ['brief', 'map', 'members', 'cases'];

/** The tabs at the foot of a phone, and what is behind "More". */
export function splitTabs(nav: readonly NavItem[]): { tabs: NavItem[]; more: NavItem[] } {
  const chosen = nav.filter((item) => item.tab ?? TABS.includes(item.key)).slice(0, 4);
  const tabs = chosen.length > 0 ? chosen : nav.slice(0, 4);
  return { tabs, more: nav.filter((item) => !tabs.includes(item)) };
}
