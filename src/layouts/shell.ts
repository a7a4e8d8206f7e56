/** Small manners of the shell: its details menus close as menus do, and "/" goes to the find box. */

const openMenus = () => [...document.querySelectorAll<HTMLDetailsElement>('details.dm[open]')];

function isTyping(target: EventTarget | null): boolean {
  return (
    target instanceof HTMLElement &&
    (target.isContentEditable || /^(INPUT|TEXTAREA|SELECT)$/.test(target.tagName))
  );
}

/** Moves along the entries of an open menu; returns whether it did. */
function walk(menu: HTMLDetailsElement, step: number): boolean {
  const items = [...menu.querySelectorAll<HTMLElement>('.menu a, .menu button')];
  if (items.length === 0) return false;
  const here = items.indexOf(document.activeElement as HTMLElement);
  items[(here + step + items.length) % items.length]?.focus();
  return true;
}

function onKey(event: KeyboardEvent): void {
  if (event.key === '/' && !event.metaKey && !event.ctrlKey && !event.altKey && !isTyping(event.target)) {
    const find = document.querySelector<HTMLElement>('[data-find]');
    if (find && find.offsetParent !== null) {
      event.preventDefault();
      find.focus();
    }
    return;
  }
  const inside =
    event.target instanceof Element ? event.target.closest<HTMLDetailsElement>('details.dm[open]') : null;
  if (event.key === 'Escape') {
    for (const menu of openMenus()) {
      menu.open = false;
      if (menu === inside) menu.querySelector('summary')?.focus();
    }
  } else if (inside && (event.key === 'ArrowDown' || event.key === 'ArrowUp')) {
    if (walk(inside, event.key === 'ArrowDown' ? 1 : -1)) event.preventDefault();
  }
}

/** Says that the connection is gone, and from when the page is. */
function watchConnection(): void {
  const note = document.querySelector<HTMLElement>('[data-offline]');
  const since = note?.querySelector('[data-offline-since]');
  if (!note || !since) return;
  const loaded = new Date().toLocaleTimeString('en-GB', { hour: '2-digit', minute: '2-digit' });
  const show = () => {
    since.textContent = navigator.onLine ? '' : `Showing this page from ${loaded}.`;
    note.hidden = navigator.onLine;
  };
  window.addEventListener('online', show);
  window.addEventListener('offline', show);
  show();
}

/** Starts listening; called once by the layout. */
export function startShell(): void {
  watchConnection();
  document.addEventListener('keydown', onKey);
  document.addEventListener('click', (event) => {
    for (const menu of openMenus()) {
      if (!(event.target instanceof Node) || !menu.contains(event.target)) menu.open = false;
    }
  });
}
