import { useEffect, useMemo, useRef, useState } from 'react';
import { IconButton, KeyHint } from '@/components/ui';
import { formatNumber } from '@/lib/format';
import { onThemeChange } from '@/lib/theme';
import type { DecodedNetwork } from '@/features/network';
import type { Handles } from '@/features/members';
import type { ExploreGroup } from '@/features/views';
import { Arranger } from '../scene/arrange';
import { buildGraph, TIES_DRAWN, type MapGraph } from '../scene/graph';
import { MapScene } from '../scene/scene';
import { HoverCard } from './HoverCard';
import { useMapKeys } from './use-map-keys';
import type { Picture } from './use-picture';
import type { StateControl } from '@/features/views/ui';

export interface StageProps {
  readonly network: DecodedNetwork;
  readonly adjacency: { offsets: Int32Array; neighbours: Int32Array };
  readonly handles: Handles | null;
  readonly ordinalOf: ReadonlyMap<string, number>;
  readonly picture: Picture;
  readonly control: StateControl;
  readonly groups: readonly ExploreGroup[];
}

/** The WebGL picture with its zoom buttons, hover card and keyboard ways. */
export function Stage({ network, adjacency, handles, ordinalOf, picture, control, groups }: StageProps) {
  const box = useRef<HTMLDivElement>(null);
  const [scene, setScene] = useState<MapScene | null>(null);
  const [graph, setGraph] = useState<MapGraph | null>(null);
  const [hovered, setHovered] = useState<{ ordinal: number; x: number; y: number } | null>(null);
  const [focused, setFocused] = useState<number | null>(null);
  const [arranging, setArranging] = useState(false);
  const arranger = useRef<Arranger | null>(null);
  // Event handlers of the scene outlive a render; they read the newest control and handles from here.
  const latest = useRef({ control, handles });
  useEffect(() => {
    latest.current = { control, handles };
  });

  useEffect(() => {
    const made = buildGraph(network);
    const next = new MapScene(box.current!, made, new Float32Array(network.n).fill(3), {
      hover: (ordinal, at) => setHovered(ordinal === null || !at ? null : { ordinal, ...at }),
      pick: (ordinal, add) => {
        const { control: now, handles: names } = latest.current;
        const id = ordinal === null ? null : names?.ids[ordinal];
        setFocused(ordinal);
        if (!id) now.set({ selection: [] });
        else if (add) {
          const has = now.state.selection.includes(id);
          now.set({
            selection: has ? now.state.selection.filter((one) => one !== id) : [...now.state.selection, id],
          });
        } else now.set({ selection: [id] });
      },
      camera: (camera) => latest.current.control.set({ camera }, true),
    });
    const { camera } = latest.current.control.state;
    if (camera) next.setCamera(camera);
    setGraph(made);
    setScene(next);
    const undo = onThemeChange(() => next.retheme());
    return () => {
      undo();
      arranger.current?.destroy();
      arranger.current = null;
      next.destroy();
    };
  }, [network]);

  const selected = useMemo(
    () => new Set(control.state.selection.flatMap((id) => ordinalOf.get(id) ?? [])),
    [control.state.selection, ordinalOf],
  );
  useEffect(() => scene?.setColours(picture.colours), [scene, picture.colours]);
  useEffect(() => scene?.setSizes(picture.sizes), [scene, picture.sizes]);
  useEffect(() => scene?.setMask(picture.mask), [scene, picture.mask]);
  useEffect(() => (handles ? scene?.setNames(handles.names) : undefined), [scene, handles]);
  useEffect(() => scene?.setSelected(selected), [scene, selected]);
  useEffect(() => {
    const only = selected.size === 1 ? [...selected][0]! : null;
    scene?.setFocused(focused ?? only);
  }, [scene, focused, selected]);
  useEffect(() => {
    scene?.setRegions(
      picture.regions,
      new Map(groups.map((group) => [group.index, group.name ?? `Group ${group.letter}`])),
    );
  }, [scene, picture.regions, groups]);

  const keys = useMapKeys({ scene, network, adjacency, handles, control, focused, setFocused });
  const arrange = (): void => {
    if (!graph) return;
    arranger.current ??= new Arranger(graph);
    if (arranging) arranger.current.pause();
    else {
      // Regions belong to the places that they were drawn for.
      scene?.setRegions([], new Map());
      arranger.current.start();
    }
    setArranging(!arranging);
  };
  const spoken =
    focused === null
      ? ''
      : `${handles?.names[focused] ?? 'Member'}, ${formatNumber(network.degree[focused]!)} ties`;
  return (
    <>
      <div
        className="map-stage"
        ref={box}
        role="application"
        tabIndex={0}
        aria-label={`Map of ${formatNumber(network.n)} members and ${formatNumber(network.ties)} ties. Arrow keys walk along ties, Enter selects. The list button shows the same members as a table.`}
        onKeyDown={keys}
      />
      <p className="vh" aria-live="polite">
        {spoken}
      </p>
      {hovered && (
        <HoverCard
          at={hovered}
          name={handles?.names[hovered.ordinal] ?? null}
          degree={network.degree[hovered.ordinal]!}
          value={null}
        />
      )}
      <div className="zoom">
        <IconButton icon="plus" label="Zoom in" onClick={() => scene?.zoom(1 / 1.5)} />
        <IconButton icon="minus" label="Zoom out" onClick={() => scene?.zoom(1.5)} />
        <IconButton icon="fit" label="Fit to canvas" onClick={() => scene?.fit()} />
        <IconButton
          icon={arranging ? 'pause' : 'play'}
          label={arranging ? 'Pause arranging' : 'Arrange members'}
          onClick={arrange}
        />
      </div>
      <div className="walk">
        <KeyHint
          hints={[
            { keys: ['←', '→'], does: 'walk ties' },
            { keys: ['Enter'], does: 'select' },
            { keys: ['+', '−'], does: 'zoom' },
          ]}
        />
        {network.ties > TIES_DRAWN && (
          <span>
            the {formatNumber(TIES_DRAWN)} strongest of {formatNumber(network.ties)} ties are drawn
          </span>
        )}
      </div>
    </>
  );
}
