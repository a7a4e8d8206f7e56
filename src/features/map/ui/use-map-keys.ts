import type { KeyboardEvent } from 'react';
import type { DecodedNetwork } from '@/features/network';
import type { Handles } from '@/features/members';
import type { MapScene } from '../scene/scene';
import { walkTo } from '../scene/walk';
import type { StateControl } from '@/features/views/ui';

interface KeySetting {
  readonly scene: MapScene | null;
  readonly network: DecodedNetwork;
  readonly adjacency: { offsets: Int32Array; neighbours: Int32Array };
  readonly handles: Handles | null;
  readonly control: StateControl;
  readonly focused: number | null;
  setFocused(ordinal: number | null): void;
}

const busiest = (network: DecodedNetwork): number =>
  network.degree.indexOf(network.degree.reduce((most: number, one: number) => Math.max(most, one), 0));

/** The Map by keyboard: arrows walk along ties, Enter selects, Escape lets go, + and − zoom, 0 fits. */
export function useMapKeys(setting: KeySetting): (event: KeyboardEvent) => void {
  const { scene, network, adjacency, handles, control, focused, setFocused } = setting;
  const walk = (key: string): void => {
    if (!scene) return;
    const start = focused ?? busiest(network);
    if (focused === null) {
      setFocused(start);
      scene.lookAt(start);
      return;
    }
    const near = adjacency.neighbours.subarray(adjacency.offsets[start]!, adjacency.offsets[start + 1]!);
    const to = walkTo(
      key,
      scene.viewportOf(start),
      Array.from(near, (ordinal) => ({ ordinal, ...scene.viewportOf(ordinal) })),
    );
    if (to === null) return;
    setFocused(to);
    scene.lookAt(to);
  };
  return (event) => {
    const { key } = event;
    if (key.startsWith('Arrow')) walk(key);
    else if (key === 'Enter' && focused !== null && handles)
      control.set({ selection: [handles.ids[focused]!] });
    else if (key === 'Escape') {
      setFocused(null);
      control.set({ selection: [] });
    } else if (key === '+' || key === '=') scene?.zoom(1 / 1.5);
    else if (key === '-') scene?.zoom(1.5);
    else if (key === '0') scene?.fit();
    else if ((event.ctrlKey || event.metaKey) && key.toLowerCase() === 'z')
      (event.shiftKey ? control.redo : control.undo)();
    else return;
    event.preventDefault();
  };
}
