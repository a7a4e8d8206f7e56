import { IconButton } from '@/components/ui';
import { formatCount } from '@/lib/format';
import type { ExploreProps } from '@/features/views';
import type { StateControl } from '@/features/views/ui';
import { membersQuery } from './columns';

/** What can be done with the chosen members; floats over the foot, after the table in focus order. */
export function BulkBar({ props, control }: { props: ExploreProps; control: StateControl }) {
  const { state, set } = control;
  const only = { ...state, filters: [{ kind: 'members' as const, members: [...state.selection] }] };
  const reading = props.readings[0];
  return (
    <div className="bulk" role="toolbar" aria-label="With the chosen members">
      <b>{formatCount(state.selection.length, 'member')} chosen</b>
      <a
        className="btn"
        href={`${props.base}/map?snapshot=${props.snapshot.id}&state=${encodeURIComponent(JSON.stringify({ ...state, columns: [] }))}`}
      >
        Show on map
      </a>
      {props.abilities.includes('export.tables') && (
        <a
          className="btn"
          href={`/api/v1/snapshots/${props.snapshot.id}/members.csv?${membersQuery(props, only)}`}
        >
          Export
        </a>
      )}
      {reading && props.abilities.includes('cases.open') && (
        <a className="btn" href={`${props.base}/readings/${reading.id}?snapshot=${props.snapshot.id}`}>
          Review in the reading
        </a>
      )}
      <IconButton icon="close" label="Let go of the chosen members" onClick={() => set({ selection: [] })} />
    </div>
  );
}
