import { useState } from 'react';
import { Chip, Menu, type MenuEntry } from '@/components/ui';
import type { Filter } from '../state';
import { formatNumber } from '@/lib/format';
import type { ExploreProps } from '../explore';
import './views.css';
import type { StateControl } from './use-view-state';

/** A field in words: "Helpfulness", "Helpfulness, departure", "Ties". */
export function fieldTitle(
  props: Pick<ExploreProps, 'attributes' | 'readings' | 'groupings'>,
  field: string,
): string {
  const [kind, id] = field.split(':');
  if (field === 'degree') return 'Ties';
  if (field === 'strength') return 'Tie strength';
  if (kind === 'attribute') return props.attributes.find((one) => one.id === id)?.name ?? 'Attribute';
  if (kind === 'group') return props.groupings.find((one) => one.id === id)?.name ?? 'Groups';
  const attribute = props.readings.find((one) => one.id === id)?.attribute ?? 'Score';
  return kind === 'q' ? `${attribute}, chance of a false flag` : `${attribute}, ${kind}`;
}

/** A filter in words, as its chip says it. */
export function filterWords(
  props: Pick<ExploreProps, 'attributes' | 'readings' | 'groupings'>,
  filter: Filter,
): string {
  switch (filter.kind) {
    case 'range': {
      const title = fieldTitle(props, filter.field);
      if (filter.low === null) return `${title}, ${formatNumber(filter.high)} or less`;
      if (filter.high === null) return `${title}, ${formatNumber(filter.low)} or more`;
      return `${title} ${formatNumber(filter.low)} to ${formatNumber(filter.high)}`;
    }
    case 'group': {
      const grouping = props.groupings.find((one) => one.id === filter.grouping);
      return filter.groups
        .map((index) => {
          const group = grouping?.groups.find((one) => one.index === index);
          return group ? `Group ${group.letter}` : 'Group';
        })
        .join(', ');
    }
    case 'label':
      return filter.labels.join(', ');
    case 'missing':
      return `${fieldTitle(props, filter.field)} ${filter.missing ? 'not recorded' : 'recorded'}`;
    case 'search':
      return `Named “${filter.text}”`;
    case 'near':
      return `Within ${filter.steps} ${filter.steps === 1 ? 'tie' : 'ties'} of one member`;
    case 'members':
      return `${formatNumber(filter.members.length)} chosen members`;
  }
}

/** Filters in force as chips, and a menu to add more. */
export function FilterChips({ props, control }: { props: ExploreProps; control: StateControl }) {
  const { state, set } = control;
  const [text, setText] = useState('');
  const add = (filter: Filter): void => set({ filters: [...state.filters, filter] });
  const chosen = state.selection[0];
  const grouping = props.groupings.find((one) => one.id === (state.seams ?? props.groupings[0]?.id));
  const entries: (MenuEntry | 'separator')[] = [
    {
      id: 'ties3',
      label: 'Ties, 3 or more',
      onAction: () => add({ kind: 'range', field: 'degree', low: 3, high: null }),
    },
    {
      id: 'ties5',
      label: 'Ties, 5 or more',
      onAction: () => add({ kind: 'range', field: 'degree', low: 5, high: null }),
    },
    ...props.readings.slice(0, 4).map((reading) => ({
      id: `q${reading.id}`,
      label: `Stands apart in ${reading.attribute}`,
      onAction: () => add({ kind: 'range', field: `q:${reading.id}`, low: null, high: 0.1 }),
    })),
    ...(grouping?.groups ?? []).slice(0, 12).map((group) => ({
      id: `g${group.index}`,
      label: `Group ${group.letter}${group.name ? `, ${group.name}` : ''}`,
      onAction: () => add({ kind: 'group', grouping: grouping!.id, groups: [group.index] }),
    })),
    ...(chosen
      ? ([1, 2] as const).map((steps) => ({
          id: `near${steps}`,
          label: `Within ${steps} ${steps === 1 ? 'tie' : 'ties'} of the chosen member`,
          onAction: () => add({ kind: 'near', member: chosen, steps }),
        }))
      : []),
  ];
  return (
    <div className="chips">
      {state.filters.map((filter, index) => (
        <Chip
          key={JSON.stringify(filter)}
          on={filter.kind === 'range'}
          onRemove={() => set({ filters: state.filters.filter((_, i) => i !== index) })}
        >
          {filterWords(props, filter)}
        </Chip>
      ))}
      <Menu trigger="Add filter" look="chip" icon="plus" entries={entries} label="Add filter" />
      {props.abilities.includes('explore.open') && (
        <form
          role="search"
          onSubmit={(event) => {
            event.preventDefault();
            if (text.trim()) add({ kind: 'search', text: text.trim() });
            setText('');
          }}
        >
          <input
            className="map-search"
            type="search"
            value={text}
            placeholder="Find a member"
            aria-label="Find a member by name"
            onChange={(event) => setText(event.target.value)}
          />
        </form>
      )}
    </div>
  );
}
