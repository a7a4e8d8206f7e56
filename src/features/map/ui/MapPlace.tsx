import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { ErrorState, LoadingState } from '@/components/ui';
import { ApiError } from '@/lib/api';
import { formatCount } from '@/lib/format';
import { handlesQuery, networkQuery } from '../data';
import type { ExploreProps } from '@/features/views';
import { adjacencyOf } from '../scene/graph';
import { FilterChips } from '@/features/views/ui';
import { MapList } from './MapList';
import { MapTools } from './MapTools';
import { MemberPanel } from './MemberPanel';
import { GroupPanel } from './GroupPanel';
import { Stage } from './Stage';
import { TideFoot } from './TideFoot';
import { usePicture } from './use-picture';
import { useViewState } from '@/features/views/ui';
import './map.css';

/** Tools, picture, strip and side panel of the Map, around one state. */
export function MapPlace(props: ExploreProps) {
  const control = useViewState(props.initial);
  const viewId = props.view?.id;
  const network = useQuery(networkQuery(props.snapshot.id, viewId));
  const handles = useQuery(handlesQuery(props.snapshot.id, viewId));
  const picture = usePicture(props, control.state, network.data, viewId);
  const adjacency = useMemo(() => (network.data ? adjacencyOf(network.data) : null), [network.data]);
  const ordinalOf = useMemo(() => new Map(handles.data?.ids.map((id, i) => [id, i])), [handles.data]);
  const { state, set } = control;
  const open = state.selection.length === 1 ? state.selection[0]! : null;

  if (network.error)
    return (
      <ErrorState
        title="The map could not be opened"
        detail={network.error instanceof ApiError ? network.error.problem.detail : 'Please try again.'}
      >
        <button type="button" className="btn" onClick={() => void network.refetch()}>
          Try again
        </button>
      </ErrorState>
    );
  const count = picture.mask ? picture.shown : props.snapshot.members;
  return (
    <div className="mapgrid">
      <section className="stage" aria-label="Map">
        <MapTools props={props} control={control} />
        {state.display === 'map' ? (
          <div className="canvas">
            <FilterChips props={props} control={control} />
            {network.data && adjacency ? (
              <Stage
                network={network.data}
                adjacency={adjacency}
                handles={handles.data ?? null}
                ordinalOf={ordinalOf}
                picture={picture}
                control={control}
                groups={props.groupings.find((one) => one.id === state.seams)?.groups ?? []}
              />
            ) : (
              <LoadingState title="Placing members">
                {formatCount(props.snapshot.members, 'member')} and {formatCount(props.snapshot.ties, 'tie')}
              </LoadingState>
            )}
          </div>
        ) : (
          <div className="canvas list">
            <FilterChips props={props} control={control} />
            <MapList props={props} control={control} viewId={viewId} />
          </div>
        )}
        <TideFoot picture={picture} control={control} shown={count} members={props.snapshot.members} />
      </section>
      {open ? (
        <MemberPanel
          props={props}
          member={open}
          viewId={viewId}
          onOpen={(id) => set({ selection: id ? [id] : [] })}
        />
      ) : (
        <GroupPanel props={props} control={control} shown={count} />
      )}
    </div>
  );
}
