import { useEffect } from 'react';

export interface CaseKeys {
  /** Addresses of the cases before and after this one in the queue. */
  readonly previous: string | null;
  readonly next: string | null;
  /** 0 to 4. */
  onChoose(index: number): void;
  onNote(): void;
}

const TYPING = 'input:not([type=radio]), textarea, select, [contenteditable], [role=dialog], [role=listbox]';

/** j and k walk the queue, 1 to 5 choose a decision, n goes to the note; never while somebody types. */
export function useCaseKeys({ previous, next, onChoose, onNote }: CaseKeys): void {
  useEffect(() => {
    const press = (event: KeyboardEvent): void => {
      if (event.ctrlKey || event.metaKey || event.altKey) return;
      if (event.target instanceof Element && event.target.closest(TYPING)) return;
      if (event.key === 'j' && next) location.assign(next);
      else if (event.key === 'k' && previous) location.assign(previous);
      else if (event.key >= '1' && event.key <= '5') onChoose(Number(event.key) - 1);
      else if (event.key === 'n') onNote();
      else return;
      event.preventDefault();
    };
    window.addEventListener('keydown', press);
    return () => window.removeEventListener('keydown', press);
  }, [previous, next, onChoose, onNote]);
}
