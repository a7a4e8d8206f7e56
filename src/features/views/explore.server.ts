import type { Actor } from '@/lib/actor';
import { Attribute, Grouping, Reading, type Snapshot } from '@/server/models';
import { abilities } from '@/features/workspaces';
import type { Access } from '@/features/workspaces/index.server';
import type { ExploreGroup, ExploreProps } from './explore';
import { fieldsOf, stateFromQuery, type ViewState } from './state';
import type { SavedView } from './views';
import { getView } from './views.server';

const groupsOf = (grouping: Grouping): ExploreGroup[] =>
  ((grouping.result as { groups?: ExploreGroup[] } | null)?.groups ?? []).map(
    ({ index, letter, name, size, islet }) => ({
      index,
      letter,
      name: name ?? null,
      size,
      islet,
    }),
  );

/** Newest finished reading of each attribute. */
async function newestReadings(snapshotId: string): Promise<Reading[]> {
  const rows = await Reading.findAll({
    where: { snapshotId, state: 'ready' },
    order: [['createdAt', 'DESC']],
  });
  const seen = new Set<string>();
  return rows.filter((row) => !seen.has(row.attributeId) && seen.add(row.attributeId));
}

/** With nothing else asked for: groups if there are any, else the first numeric attribute. */
function startState(
  state: ViewState,
  attributes: readonly Attribute[],
  groupings: readonly Grouping[],
): ViewState {
  if (state.colour.by !== 'plain') return state;
  const grouping = groupings[0];
  const number = attributes.find((one) => one.type === 'number');
  if (grouping)
    return { ...state, colour: { by: 'group', of: grouping.id }, seams: state.seams ?? grouping.id };
  return number ? { ...state, colour: { by: 'attribute', of: number.id } } : state;
}

/**
 * What the Map and the Members table start from, with only what this person may see: through a shared view,
 * only its own attributes, readings and groupings, and groups too small to show without their size.
 */
export async function exploreProps(
  actor: Actor,
  snapshot: Snapshot,
  access: Access,
  asked: { stateText: string | null; viewId?: string },
): Promise<ExploreProps> {
  const view: SavedView | null = asked.viewId ? await getView(actor, asked.viewId) : null;
  const [attributes, readings, groupings] = await Promise.all([
    Attribute.findAll({ where: { snapshotId: snapshot.id }, order: [['ordinal', 'ASC']] }),
    newestReadings(snapshot.id),
    Grouping.findAll({
      where: { snapshotId: snapshot.id, state: 'ready' },
      order: [['createdAt', 'DESC']],
      limit: 20,
    }),
  ]);
  const free = access.can('explore.open');
  const fields = view && !free ? fieldsOf(view.state) : null;
  const allowed = (...names: string[]): boolean => !fields || names.some((name) => fields.has(name));
  const state = view && !asked.stateText ? view.state : stateFromQuery(asked.stateText);
  return {
    base: `/w/${snapshot.workspaceId}/c/${snapshot.communityId}`,
    communityId: snapshot.communityId,
    snapshot: { id: snapshot.id, members: snapshot.members, ties: snapshot.ties, takenOn: snapshot.takenOn },
    attributes: attributes
      .filter(({ id }) => allowed(`attribute:${id}`))
      .map(({ id, name, type }) => ({ id, name, type: type as 'number' | 'label' })),
    readings: readings
      .filter(({ id }) => allowed(`smoothed:${id}`, `departure:${id}`))
      .map(({ id, attribute, attributeId, createdAt }) => ({
        id,
        attribute,
        attributeId,
        createdAt: createdAt.toISOString(),
      })),
    groupings: groupings
      .filter(({ id }) => allowed(`group:${id}`))
      .map((grouping) => ({
        id: grouping.id,
        name: grouping.name,
        groups: groupsOf(grouping).filter((group) => free || group.size >= access.workspace.smallestGroup),
      })),
    abilities: abilities(access.role),
    initial: view ? state : startState(state, attributes, groupings),
    view,
  };
}
