import { TideStrip } from '@/components/charts/TideStrip';
import { formatNumber } from '@/lib/format';
import type { Filter } from '@/features/views';
import type { Picture } from './use-picture';
import type { StateControl } from '@/features/views/ui';

/** The range filter that the strip holds, if there is one. */
export const rangeOf = (filters: readonly Filter[], field: string | null): [number, number] | null => {
  const filter = filters.find((one) => one.kind === 'range' && one.field === field);
  return filter?.kind === 'range' && filter.low !== null && filter.high !== null
    ? [filter.low, filter.high]
    : null;
};

/** The distribution along the foot of the map; brushing it filters. */
export function TideFoot({
  picture,
  control,
  shown,
  members,
}: {
  picture: Picture;
  control: StateControl;
  shown: number;
  members: number;
}) {
  const { stripField, strip } = picture;
  const { state, set } = control;
  if (!strip || !stripField) return <div className="foot" aria-busy="true" />;
  const brush = (range: [number, number] | null): void => {
    const others = state.filters.filter((one) => !(one.kind === 'range' && one.field === stripField));
    set({
      filters: range
        ? [...others, { kind: 'range', field: stripField, low: range[0], high: range[1] }]
        : others,
    });
  };
  const same = picture.scale.kind === 'diverging';
  return (
    <div className="foot">
      <TideStrip
        label={picture.title}
        sub={state.colour.by === 'group' ? 'stacked by group' : same ? 'same ramp as the map' : 'all members'}
        summary={
          <>
            <b>{formatNumber(shown)}</b> of {formatNumber(members)}
          </>
        }
        bins={strip.bins}
        missing={strip.missing}
        selection={rangeOf(state.filters, stripField)}
        onChange={brush}
      />
    </div>
  );
}
