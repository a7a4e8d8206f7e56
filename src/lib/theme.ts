/** The two themes. The choice lives in a cookie, so the server can paint the right one first. */

export type Theme = 'linen' | 'evening';
export const THEME_COOKIE = 'theme';

/** A cookie's value → a theme, or undefined when the person has not chosen (then the system decides). */
export function parseTheme(value: string | undefined): Theme | undefined {
  return value === 'linen' || value === 'evening' ? value : undefined;
}

/** Calls back after each change of theme (canvas and WebGL must read their colours again); returns the undo. */
export function onThemeChange(callback: (theme: Theme) => void): () => void {
  const listen = () => callback(document.documentElement.dataset.theme === 'evening' ? 'evening' : 'linen');
  document.addEventListener('thrum:theme', listen);
  return () => document.removeEventListener('thrum:theme', listen);
}
