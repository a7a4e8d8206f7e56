import { useCallback, useEffect, useReducer } from 'react';
import { stateToQuery, type ViewState } from '../state';

interface History {
  readonly past: readonly ViewState[];
  readonly now: ViewState;
  readonly future: readonly ViewState[];
}
type Step =
  | { kind: 'set'; change: Partial<ViewState>; quiet: boolean }
  | { kind: 'undo' }
  | { kind: 'redo' }
  | { kind: 'replace'; state: ViewState };

const DEEP = 100;

function reduce(history: History, step: Step): History {
  const { past, now, future } = history;
  if (step.kind === 'undo') {
    const last = past.at(-1);
    return last ? { past: past.slice(0, -1), now: last, future: [now, ...future] } : history;
  }
  if (step.kind === 'redo') {
    const [next, ...rest] = future;
    return next ? { past: [...past, now], now: next, future: rest } : history;
  }
  const next = step.kind === 'replace' ? step.state : { ...now, ...step.change };
  // Moving the camera is not a step that a person would want to undo.
  if (step.kind === 'set' && step.quiet) return { ...history, now: next };
  return { past: [...past, now].slice(-DEEP), now: next, future: [] };
}

export interface StateControl {
  readonly state: ViewState;
  set(change: Partial<ViewState>, quiet?: boolean): void;
  replace(state: ViewState): void;
  undo(): void;
  redo(): void;
  readonly canUndo: boolean;
  readonly canRedo: boolean;
}

/** The state of the Map: kept in the address, so that a link opens it again, with undo and redo. */
export function useViewState(initial: ViewState): StateControl {
  const [history, dispatch] = useReducer(reduce, { past: [], now: initial, future: [] });
  const state = history.now;
  useEffect(() => {
    const later = setTimeout(() => {
      const url = new URL(location.href);
      url.searchParams.delete('state');
      const rest = url.searchParams.toString();
      const text = stateToQuery(state);
      window.history.replaceState(null, '', `${url.pathname}?${rest}${rest ? '&' : ''}state=${text}`);
    }, 200);
    return () => clearTimeout(later);
  }, [state]);
  const set = useCallback(
    (change: Partial<ViewState>, quiet = false) => dispatch({ kind: 'set', change, quiet }),
    [],
  );
  const replace = useCallback((next: ViewState) => dispatch({ kind: 'replace', state: next }), []);
  const undo = useCallback(() => dispatch({ kind: 'undo' }), []);
  const redo = useCallback(() => dispatch({ kind: 'redo' }), []);
  return {
    state,
    set,
    replace,
    undo,
    redo,
    canUndo: history.past.length > 0,
    canRedo: history.future.length > 0,
  };
}
