import { Tag } from '@/components/ui';
import { formatCount, formatNumber } from '@/lib/format';
import type { ExploreProps } from '@/features/views';
import type { StateControl } from '@/features/views/ui';

/** Beside the picture while nobody is chosen: the groups, or what to do first. */
export function GroupPanel({
  props,
  control,
  shown,
}: {
  props: ExploreProps;
  control: StateControl;
  shown: number;
}) {
  const { state, set } = control;
  const grouping = props.groupings.find((one) => one.id === (state.seams ?? props.groupings[0]?.id));
  const chosen = state.selection.length;
  return (
    <aside className="panel" aria-label="About this map">
      {chosen > 1 && (
        <div>
          <h2 className="h3">{formatCount(chosen, 'member')} chosen</h2>
          <div className="row wrap" style={{ marginTop: 8 }}>
            <button
              type="button"
              className="btn sm"
              onClick={() =>
                set({ filters: [...state.filters, { kind: 'members', members: [...state.selection] }] })
              }
            >
              Show only these
            </button>
            <button type="button" className="btn quiet sm" onClick={() => set({ selection: [] })}>
              Let go
            </button>
          </div>
        </div>
      )}
      <div>
        <h2 className="h3">{props.view?.name ?? grouping?.name ?? 'This snapshot'}</h2>
        <p className="small mut">
          {formatNumber(shown)} of {formatCount(props.snapshot.members, 'member')} shown,{' '}
          {formatCount(props.snapshot.ties, 'tie')}
        </p>
        {props.view?.note && <p className="small ink2">{props.view.note}</p>}
      </div>
      {grouping ? (
        <ul className="group-list">
          {grouping.groups.map((group) => (
            <li key={group.index}>
              <Tag letter={group.letter} />
              <button
                type="button"
                className="linkish"
                onClick={() =>
                  set({ filters: [{ kind: 'group', grouping: grouping.id, groups: [group.index] }] })
                }
              >
                {group.name ?? `Group ${group.letter}`}
              </button>
              <span className="r">{formatNumber(group.size)}</span>
            </li>
          ))}
        </ul>
      ) : (
        props.abilities.includes('analysis.make') && (
          <p className="small ink2">
            No grouping yet. <a href={`${props.base}/groups?snapshot=${props.snapshot.id}`}>Make one</a> to
            see where this community could come apart.
          </p>
        )
      )}
      <p className="small mut">Click a member for their scores and ties. Shift-click chooses several.</p>
    </aside>
  );
}
