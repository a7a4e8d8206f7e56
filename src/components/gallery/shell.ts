import type { NavItem } from '@/layouts/shell.types';

/** A navigation and a person for the gallery pages. */
export const galleryShell = (current: string) => {
  const places: NavItem[] = [
    { key: 'brief', label: 'Brief', href: '/dev/shell', icon: 'brief' },
    { key: 'map', label: 'Map', href: '#map', icon: 'map' },
    { key: 'members', label: 'Members', href: '#members', icon: 'members', count: '1,264' },
    { key: 'groups', label: 'Groups', href: '#groups', icon: 'groups', count: 8 },
    { key: 'readings', label: 'Readings', href: '/dev/charts', icon: 'readings', count: 5 },
    { key: 'cases', label: 'Cases', href: '#cases', icon: 'cases', badge: 9 },
    {
      key: 'introductions',
      label: 'Introductions',
      href: '#introductions',
      icon: 'introductions',
      count: 14,
    },
    { key: 'soundings', label: 'Soundings', href: '#soundings', icon: 'soundings' },
    { key: 'imports', label: 'Imports', href: '#imports', icon: 'imports' },
    { key: 'settings', label: 'Settings', href: '#settings', icon: 'settings' },
  ];
  return {
    nav: places.map((place) => ({ ...place, current: place.key === current })),
    workspace: { id: 'w', name: 'Estuary Commons', initials: 'EC' },
    person: {
      name: 'Orla Tennant-Rye',
      initials: 'OT',
      email: 'orla@estuary-commons.example',
      role: 'Analyst',
    },
    community: { id: 'c', name: 'Saltmarsh Growers’ Exchange' },
    communities: [
      { id: 'c', name: 'Saltmarsh Growers’ Exchange', href: '#c' },
      { id: 'd', name: 'Tidewater Menders', href: '#d' },
    ],
    allCommunitiesHref: '#all',
    snapshot: { id: 's', label: '28 Nov 2026', takenOn: '2026-11-28', ties: 6978 },
    snapshots: [
      { id: 's', label: '28 Nov 2026', href: '#s' },
      { id: 't', label: '31 Aug 2026', href: '#t' },
    ],
    helpHref: '#help',
    searchAction: '#find',
  };
};
