import { useQuery } from '@tanstack/react-query';
import { EmptyState, SkeletonTable } from '@/components/ui';
import type { MembersPage } from '@/features/members';
import { getJson } from '@/lib/api';
import { formatNumber } from '@/lib/format';
import { colourField, type ExploreProps } from '@/features/views';
import { fieldTitle } from '@/features/views/ui';
import type { StateControl } from '@/features/views/ui';

const ROWS = 200;

/** The same members as the picture, as a table: an equal alternative for every screen and reader. */
export function MapList({
  props,
  control,
  viewId,
}: {
  props: ExploreProps;
  control: StateControl;
  viewId?: string;
}) {
  const { state, set } = control;
  const field = colourField(state.colour);
  const columns = ['degree', ...(field ? [field] : [])];
  const rows = useQuery({
    queryKey: ['list', props.snapshot.id, columns, state.filters, viewId],
    queryFn: ({ signal }) => {
      const query = new URLSearchParams({
        columns: columns.join(','),
        sort: '-degree',
        filter: JSON.stringify(state.filters),
        limit: String(ROWS),
        ...(viewId ? { view: viewId } : {}),
      });
      return getJson<MembersPage>(
        `/api/v1/snapshots/${props.snapshot.id}/members?${query.toString()}`,
        signal,
      );
    },
  });
  if (!rows.data) return <SkeletonTable label="Members" rows={12} />;
  if (rows.data.total === 0)
    return (
      <EmptyState title="No member matches all filters">
        <button type="button" className="btn sm" onClick={() => set({ filters: [] })}>
          Clear filters
        </button>
      </EmptyState>
    );
  const grouping = props.groupings.find((one) => `group:${one.id}` === field);
  const cell = (value: number | string | null | undefined): string => {
    if (value === null || value === undefined) return '–';
    if (grouping) {
      const group = grouping.groups.find((one) => one.index === value);
      return group ? `${group.letter} ${group.name ?? ''}` : '–';
    }
    return typeof value === 'number' ? formatNumber(value) : value;
  };
  return (
    <div className="tw" tabIndex={0} role="region" aria-label="Members on the map">
      <table className="tbl">
        <thead>
          <tr>
            <th scope="col">Member</th>
            {columns.map((column) => (
              <th key={column} scope="col" className="r">
                {fieldTitle(props, column)}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.data.items.map((row) => (
            <tr key={row.id} className={state.selection.includes(row.id) ? 'on' : undefined}>
              <th scope="row">
                <button type="button" className="linkish b" onClick={() => set({ selection: [row.id] })}>
                  {row.name ?? row.code}
                </button>
              </th>
              {columns.map((column) => (
                <td key={column} className="r">
                  {cell(row.values[column])}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
      {rows.data.total > ROWS && (
        <p className="small mut" style={{ padding: '8px 16px' }}>
          The {ROWS} best connected of {formatNumber(rows.data.total)}; the Members page has them all.
        </p>
      )}
    </div>
  );
}
