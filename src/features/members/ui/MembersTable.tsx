import { createColumnHelper, tableFeatures, useTable } from '@tanstack/react-table';
import { useVirtualizer } from '@tanstack/react-virtual';
import { useEffect, useMemo, useRef } from 'react';
import { Checkbox, Icon } from '@/components/ui';
import { formatNumber } from '@/lib/format';
import type { ExploreProps } from '@/features/views';
import { fieldTitle, type StateControl } from '@/features/views/ui';
import type { MemberRow } from '../members';
import { Cell } from './Cell';
import { shownColumns } from './columns';

const ROW = 36;
/** Sorting, filtering and paging are the server's; the table only knows its columns and rows. */
const features = tableFeatures({});
const helper = createColumnHelper<typeof features, MemberRow>();

interface TableProps {
  readonly props: ExploreProps;
  readonly control: StateControl;
  readonly rows: readonly MemberRow[];
  readonly total: number;
  onMore(): void;
}

const isText = (field: string): boolean => field.startsWith('group:');

/** The table itself: sticky head, only the rows in sight are in the page, more are fetched while scrolling. */
export function MembersTable({ props, control, rows, total, onMore }: TableProps) {
  const { state, set } = control;
  const fields = shownColumns(props, state);
  const columns = useMemo(() => fields.map((field) => helper.display({ id: field })), [fields]);
  const data = useMemo(() => [...rows], [rows]);
  const table = useTable({ features, columns, data, getRowId: (row) => row.id });
  const scroller = useRef<HTMLDivElement>(null);
  const virtual = useVirtualizer({
    count: rows.length,
    getScrollElement: () => scroller.current,
    estimateSize: () => ROW,
    overscan: 12,
  });
  const visible = virtual.getVirtualItems();
  const last = visible.at(-1)?.index ?? 0;
  useEffect(() => {
    if (rows.length < total && last >= rows.length - 20) onMore();
  }, [last, rows.length, total, onMore]);
  const most = useMemo(() => {
    const departures = fields.filter((field) => field.startsWith('departure:'));
    return Math.max(
      1e-9,
      ...rows.flatMap((row) => departures.map((field) => Math.abs(Number(row.values[field] ?? 0)))),
    );
  }, [rows, fields]);
  const chosen = new Set(state.selection);
  const toggle = (id: string): void =>
    set({
      selection: chosen.has(id)
        ? state.selection.filter((one) => one !== id)
        : [...state.selection, id].slice(-1000),
    });
  const all = rows.length > 0 && rows.every((row) => chosen.has(row.id));
  const sortBy = (field: string): void => {
    const same = state.sort?.field === field;
    set({
      sort:
        same && state.sort?.descending === false
          ? { field, descending: true }
          : same
            ? null
            : { field, descending: false },
    });
  };
  const sortOf = (field: string): 'ascending' | 'descending' | 'none' =>
    state.sort?.field === field ? (state.sort.descending ? 'descending' : 'ascending') : 'none';
  const before = visible[0]?.start ?? 0;
  const after = virtual.getTotalSize() - (visible.at(-1)?.end ?? 0);
  const tableRows = table.getRowModel().rows;
  const head = (field: string, title: string, right: boolean) => (
    <th key={field} scope="col" aria-sort={sortOf(field)} className={right ? 'r' : undefined}>
      <button type="button" className="th-s" onClick={() => sortBy(field)}>
        {title}
        {sortOf(field) !== 'none' && (
          <Icon name={sortOf(field) === 'ascending' ? 'chevron-up' : 'chevron-down'} small />
        )}
      </button>
    </th>
  );
  return (
    <div className="tw" ref={scroller} tabIndex={0} role="region" aria-label="Members table">
      <table className="tbl" aria-rowcount={total + 1}>
        <thead>
          <tr>
            <th scope="col">
              <Checkbox
                label="Choose all rows read so far"
                hideLabel
                checked={all}
                indeterminate={!all && chosen.size > 0}
                onChange={() => set({ selection: all ? [] : rows.slice(0, 1000).map((row) => row.id) })}
              />
            </th>
            {head('name', 'Member', false)}
            {fields.map((field) => head(field, fieldTitle(props, field), !isText(field)))}
          </tr>
        </thead>
        <tbody>
          {before > 0 && (
            <tr aria-hidden="true">
              <td colSpan={fields.length + 2} style={{ height: before, padding: 0, border: 0 }} />
            </tr>
          )}
          {visible.map((item) => {
            const row = tableRows[item.index]?.original;
            if (!row) return null;
            const name = row.name ?? row.code ?? row.id;
            return (
              <tr
                key={row.id}
                aria-rowindex={item.index + 2}
                className={chosen.has(row.id) ? 'on' : undefined}
                style={{ height: ROW }}
              >
                <td>
                  <Checkbox
                    label={`Choose ${name}`}
                    hideLabel
                    checked={chosen.has(row.id)}
                    onChange={() => toggle(row.id)}
                  />
                </td>
                <th scope="row">
                  <a
                    className="hd"
                    href={`${props.base}/map?snapshot=${props.snapshot.id}&state=${encodeURIComponent(JSON.stringify({ ...state, selection: [row.id] }))}`}
                  >
                    {name}
                  </a>
                </th>
                {fields.map((field) => (
                  <td key={field} className={isText(field) ? undefined : 'r'}>
                    <Cell props={props} row={row} field={field} most={most} />
                  </td>
                ))}
              </tr>
            );
          })}
          {after > 0 && (
            <tr aria-hidden="true">
              <td colSpan={fields.length + 2} style={{ height: after, padding: 0, border: 0 }} />
            </tr>
          )}
        </tbody>
      </table>
      {rows.length < total && (
        <p className="small mut more">Reading more, {formatNumber(rows.length)} so far…</p>
      )}
    </div>
  );
}
