import type { Actor } from '@/lib/actor';
import { formatNumber } from '@/lib/format';
import { notFound } from '@/lib/problem';
import { Case, Community, Grouping, Reading, Snapshot } from '@/server/models';
import { abilities, type Action } from '@/features/workspaces';
import { authorise, type Access } from '@/features/workspaces/index.server';
import { initials, placeHref, type NavItem, type Place, type ShellData } from './shell';

export interface PlaceRequest {
  readonly workspaceId: string;
  /** Left out for pages of the workspace itself, such as its settings. */
  readonly communityId?: string;
  /** Snapshot asked for in the address; the newest otherwise. */
  readonly snapshotId?: string | null;
  readonly place: Place;
  /** What opening this place needs. */
  readonly action: Action;
}

export interface OpenPlace {
  readonly access: Access;
  readonly abilities: readonly Action[];
  readonly community: Community | null;
  readonly snapshot: Snapshot | null;
  readonly shell: ShellData;
}

/** Which action each place needs; a place that a role cannot open is not in its navigation. */
const NEEDS: Record<Place, Action> = {
  brief: 'brief.open',
  map: 'explore.open',
  members: 'explore.open',
  groups: 'explore.open',
  readings: 'explore.open',
  cases: 'cases.read',
  views: 'views.open',
  imports: 'analysis.make',
  settings: 'workspace.manage',
};

const LABELS: Record<Place, string> = {
  brief: 'Brief',
  map: 'Map',
  members: 'Members',
  groups: 'Groups',
  readings: 'Readings',
  cases: 'Cases',
  views: 'Saved views',
  imports: 'Imports',
  settings: 'Settings',
};

/**
 * Opens a place for a person: checks the right, finds community and snapshot inside the workspace,
 * and gathers what the shell shows.
 * @throws ProblemError 404 for outsiders and for a community or snapshot that is not of this workspace, 403 by role.
 */
export async function openPlace(actor: Actor, request: PlaceRequest): Promise<OpenPlace> {
  const access = await authorise(actor, request.workspaceId, request.action);
  const workspaceId = access.workspace.id;
  const communities = await Community.findAll({ where: { workspaceId }, order: [['createdAt', 'ASC']] });
  const community = request.communityId
    ? communities.find((one) => one.id === request.communityId)
    : communities[0];
  if (request.communityId && !community) throw notFound();
  const snapshots = community
    ? await Snapshot.findAll({
        where: { communityId: community.id, workspaceId, state: 'ready' },
        order: [
          ['takenOn', 'DESC'],
          ['createdAt', 'DESC'],
        ],
      })
    : [];
  const snapshot = request.snapshotId ? snapshots.find((one) => one.id === request.snapshotId) : snapshots[0];
  if (request.snapshotId && !snapshot) throw notFound();
  const nav = community
    ? await navigation(access, community, snapshot, request.place)
    : settingsOnly(access, request.place);
  return {
    access,
    abilities: abilities(access.role),
    community: community ?? null,
    snapshot: snapshot ?? null,
    shell: {
      workspace: { id: workspaceId, name: access.workspace.name, initials: initials(access.workspace.name) },
      person: { name: actor.name, initials: initials(actor.name), email: actor.email },
      ...(community ? { community: { id: community.id, name: community.name } } : {}),
      communities: communities.map(({ id, name }) => ({
        id,
        name,
        href: placeHref(workspaceId, id, 'brief'),
      })),
      ...(snapshot
        ? {
            snapshot: {
              id: snapshot.id,
              label: snapshot.label,
              takenOn: snapshot.takenOn,
              members: snapshot.members,
              ties: snapshot.ties,
            },
          }
        : {}),
      snapshots: community
        ? snapshots.map(({ id, label, takenOn }) => ({
            id,
            label,
            takenOn,
            href: placeHref(workspaceId, community.id, request.place, id),
          }))
        : [],
      nav,
      ...(access.can('explore.open') && !access.can(NEEDS.settings)
        ? { settingsHref: `/w/${workspaceId}/settings/tokens` }
        : {}),
    },
  };
}

function settingsOnly(access: Access, place: Place): NavItem[] {
  if (!access.can(NEEDS.settings)) return [];
  const href = placeHref(access.workspace.id, '', 'settings');
  return [{ key: 'settings', label: LABELS.settings, href, icon: 'settings', current: place === 'settings' }];
}

async function navigation(
  access: Access,
  community: Community,
  snapshot: Snapshot | undefined,
  current: Place,
): Promise<NavItem[]> {
  const [grouping, readings, open] = await Promise.all([
    snapshot
      ? Grouping.findOne({
          where: { snapshotId: snapshot.id, state: 'ready' },
          order: [['createdAt', 'DESC']],
        })
      : null,
    snapshot ? Reading.count({ where: { snapshotId: snapshot.id, state: 'ready' } }) : 0,
    Case.count({ where: { communityId: community.id, state: 'open' } }),
  ]);
  const counts: Partial<Record<Place, number | undefined>> = {
    members: snapshot?.members,
    groups: grouping?.k ?? undefined,
    readings: readings || undefined,
  };
  return (Object.keys(NEEDS) as Place[])
    .filter((place) => access.can(NEEDS[place]))
    .map((place) => {
      const count = counts[place];
      return {
        key: place,
        label: LABELS[place],
        href: placeHref(access.workspace.id, community.id, place, snapshot?.id),
        icon: place === 'views' ? 'bookmark' : place,
        ...(count === undefined ? {} : { count: formatNumber(count) }),
        ...(place === 'cases' && open > 0 ? { badge: open } : {}),
        current: place === current,
      };
    });
}
