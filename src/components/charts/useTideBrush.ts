import { useRef, type PointerEvent, type RefObject } from 'react';
import { moveEdge, shiftRange, type EdgeRange } from './bins';

interface Drag {
  kind: 'new' | 'move' | 'low' | 'high';
  start: number;
  range: EdgeRange;
}

/**
 * Dragging on a strip of `bins` bins: across it makes a range, the range itself moves, a handle moves one end.
 * A plain click outside the range takes it away. `onRange(null)` means everything.
 */
export function useTideBrush(
  water: RefObject<HTMLDivElement | null>,
  bins: number,
  range: EdgeRange | null,
  onRange: (range: EdgeRange | null) => void,
) {
  const drag = useRef<Drag | null>(null);
  const placeOf = (event: PointerEvent) => {
    const box = water.current?.getBoundingClientRect();
    return box && box.width > 0 ? ((event.clientX - box.left) / box.width) * bins : 0;
  };
  const onPointerDown = (event: PointerEvent<HTMLDivElement>) => {
    if (event.button !== 0) return;
    const part = (event.target as Element).closest<HTMLElement>('[data-part]')?.dataset.part;
    const kind = part === 'low' || part === 'high' ? part : part === 'brush' ? 'move' : 'new';
    drag.current = { kind, start: placeOf(event), range: range ?? [0, bins] };
    water.current?.setPointerCapture(event.pointerId);
  };
  const onPointerMove = (event: PointerEvent<HTMLDivElement>) => {
    const now = drag.current;
    if (!now) return;
    const place = placeOf(event);
    const by = Math.round(place - now.start);
    if (now.kind === 'move') onRange(shiftRange(now.range, by, bins));
    else if (now.kind === 'new') {
      const low = Math.max(0, Math.floor(Math.min(place, now.start)));
      const high = Math.min(bins, Math.ceil(Math.max(place, now.start)));
      if (Math.abs(place - now.start) > 0.4) onRange([low, Math.max(low + 1, high)]);
    } else onRange(moveEdge(now.range, now.kind, by, bins));
  };
  const onPointerUp = (event: PointerEvent<HTMLDivElement>) => {
    const now = drag.current;
    drag.current = null;
    if (now?.kind === 'new' && range && Math.abs(placeOf(event) - now.start) <= 0.4) onRange(null);
  };
  const onPointerCancel = () => {
    drag.current = null;
  };
  return { onPointerDown, onPointerMove, onPointerUp, onPointerCancel };
}
