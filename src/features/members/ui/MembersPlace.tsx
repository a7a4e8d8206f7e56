import { useInfiniteQuery } from '@tanstack/react-query';
import { Button, EmptyState, ErrorState, Menu, SkeletonTable } from '@/components/ui';
import { getJson } from '@/lib/api';
import { formatNumber } from '@/lib/format';
import type { ExploreProps } from '@/features/views';
import { FilterChips, filterWords, SavedViews, useViewState } from '@/features/views/ui';
import type { MembersPage } from '../members';
import { BulkBar } from './BulkBar';
import { ColumnsButton } from './ColumnsButton';
import { membersQuery } from './columns';
import { MembersTable } from './MembersTable';
import './members.css';

const PAGE = 100;

/** Title, filters, columns and the table of Members, around one state. */
export function MembersPlace(props: ExploreProps) {
  const control = useViewState(props.initial);
  const { state, set } = control;
  const url = `/api/v1/snapshots/${props.snapshot.id}/members`;
  const rows = useInfiniteQuery({
    queryKey: ['members', props.snapshot.id, membersQuery(props, state)],
    initialPageParam: '',
    queryFn: ({ pageParam, signal }) =>
      getJson<MembersPage>(
        `${url}?${membersQuery(props, state, { limit: String(PAGE), ...(pageParam ? { cursor: pageParam } : {}) })}`,
        signal,
      ),
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    placeholderData: (before) => before,
  });
  const total = rows.data?.pages[0]?.total ?? props.snapshot.members;
  const items = rows.data?.pages.flatMap((page) => page.items) ?? [];
  const exportHref = (format: string): string => `${url}.${format}?${membersQuery(props, state)}`;
  const networkHref = (format: string): string => `/api/v1/snapshots/${props.snapshot.id}/network.${format}`;
  return (
    <div className="mem">
      <div className="hd1">
        <h1 className="h1">Members</h1>
        <span className="mut">
          {formatNumber(props.snapshot.members)} in this snapshot
          {total !== props.snapshot.members && `, ${formatNumber(total)} shown`}
        </span>
        <span className="grow" />
        {props.abilities.includes('export.tables') && (
          <Menu
            trigger={`Export ${formatNumber(total)} rows`}
            icon="download"
            placement="bottom end"
            entries={[
              { id: 'csv', label: 'CSV', description: 'For any spreadsheet', href: exportHref('csv') },
              {
                id: 'xlsx',
                label: 'Workbook (XLSX)',
                description: 'Numbers stay numbers',
                href: exportHref('xlsx'),
              },
              { id: 'jsonl', label: 'JSON Lines', description: 'For programs', href: exportHref('jsonl') },
              { id: 'parquet', label: 'Parquet', description: 'For data tools', href: exportHref('parquet') },
              'separator',
              {
                id: 'gexf',
                label: 'Network as GEXF',
                description: 'All members and ties',
                href: networkHref('gexf'),
              },
              {
                id: 'graphml',
                label: 'Network as GraphML',
                description: 'All members and ties',
                href: networkHref('graphml'),
              },
            ]}
          />
        )}
      </div>
      <div className="tb">
        <FilterChips props={props} control={control} />
        <span className="grow" />
        <a
          className="btn sm"
          href={`${props.base}/map?snapshot=${props.snapshot.id}&state=${encodeURIComponent(JSON.stringify(state))}`}
        >
          On the map
        </a>
        <SavedViews props={props} control={control} place="members" />
        <ColumnsButton props={props} control={control} />
      </div>
      {rows.error && (
        <ErrorState title="The table could not be read" detail={rows.error.message}>
          <Button onClick={() => void rows.refetch()}>Try again</Button>
        </ErrorState>
      )}
      {!rows.data && !rows.error && <SkeletonTable label="Members" rows={14} />}
      {rows.data && total === 0 && (
        <EmptyState title="No member matches all filters">
          <p className="ink2">{state.filters.map((filter) => filterWords(props, filter)).join(' · ')}</p>
          <Button size="small" onClick={() => set({ filters: [] })}>
            Clear filters
          </Button>
        </EmptyState>
      )}
      {rows.data && total > 0 && (
        <MembersTable
          props={props}
          control={control}
          rows={items}
          total={total}
          onMore={() => {
            if (rows.hasNextPage && !rows.isFetchingNextPage) void rows.fetchNextPage();
          }}
        />
      )}
      <div className="pgf small">
        <span className="mut">≈ filled in from neighbours, no answer recorded</span>
        <span className="grow" />
        <span>
          Rows 1 to {formatNumber(items.length)} of {formatNumber(total)}
        </span>
      </div>
      {state.selection.length > 0 && <BulkBar props={props} control={control} />}
    </div>
  );
}
