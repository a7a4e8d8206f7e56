import type { ExploreProps, ViewState } from '@/features/views';
import { fieldTitle } from '@/features/views/ui';

export interface ColumnChoice {
  readonly field: string;
  readonly title: string;
}

/** Every column that this snapshot offers, in the order of the chooser. */
export function columnChoices(props: ExploreProps): ColumnChoice[] {
  const fields = [
    ...props.groupings.map((one) => `group:${one.id}`),
    ...props.attributes.map((one) => `attribute:${one.id}`),
    ...props.readings.flatMap(({ id }) => [`smoothed:${id}`, `departure:${id}`, `q:${id}`]),
    'degree',
    'strength',
  ];
  return fields.map((field) => ({ field, title: fieldTitle(props, field) }));
}

/** Columns shown when a person has not chosen: group, the newest reading in full, other attributes, ties. */
export function defaultColumns(props: ExploreProps): string[] {
  const reading = props.readings[0];
  const grouping = props.groupings[0];
  const own = reading
    ? [
        `attribute:${reading.attributeId}`,
        `smoothed:${reading.id}`,
        `departure:${reading.id}`,
        `q:${reading.id}`,
      ]
    : [];
  const others = props.attributes
    .filter((one) => one.id !== reading?.attributeId)
    .map((one) => `attribute:${one.id}`);
  return [...(grouping ? [`group:${grouping.id}`] : []), ...own, ...others, 'degree'];
}

/** Columns in force for a state. */
export const shownColumns = (props: ExploreProps, state: ViewState): string[] =>
  state.columns.length > 0 ? state.columns : defaultColumns(props);

/** Query string of a members request for a state; the same for the table and for its exports. */
export function membersQuery(
  props: ExploreProps,
  state: ViewState,
  extra: Record<string, string> = {},
): string {
  const query = new URLSearchParams({
    columns: shownColumns(props, state).join(','),
    filter: JSON.stringify(state.filters),
    ...extra,
  });
  if (state.sort) query.set('sort', `${state.sort.descending ? '-' : ''}${state.sort.field}`);
  if (props.view && !props.abilities.includes('explore.open')) query.set('view', props.view.id);
  return query.toString();
}
