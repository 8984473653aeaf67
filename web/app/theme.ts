/** Puts the theme on the document. */
import type { SessionState } from '../session/state.ts';

type Theme = SessionState['theme'];
const storeKey = 'evenglow-theme';

/** The theme that this browser remembers; `system` where it remembers none, or may not. */
export function rememberedTheme(): Theme {
  try {
    const kept = localStorage.getItem(storeKey);
    return kept === 'dark' || kept === 'light' ? kept : 'system';
  } catch {
    return 'system';
  }
}

/** Remembers the theme in this browser, where it may. */
export function rememberTheme(theme: Theme): void {
  try {
    localStorage.setItem(storeKey, theme);
  } catch {
    // A browser that keeps nothing shows the theme until the page is closed.
  }
}

/** Keeps `data-theme` of the document at `dark` or `light` as `theme()` and the system say; paper is always light. Gives back how to show a change of theme, and how to stop. */
export function watchTheme(theme: () => Theme, root: HTMLElement = document.documentElement): { show: () => void; stop: () => void } {
  const systemIsLight = matchMedia('(prefers-color-scheme: light)');
  const set = (name: 'dark' | 'light'): void => {
    root.dataset['theme'] = name;
  };
  const show = (): void => {
    const wanted = theme();
    set(wanted === 'system' ? (systemIsLight.matches ? 'light' : 'dark') : wanted);
  };
  const paper = (): void => { set('light'); };
  systemIsLight.addEventListener('change', show);
  addEventListener('beforeprint', paper);
  addEventListener('afterprint', show);
  show();
  return {
    show,
    stop: () => {
      systemIsLight.removeEventListener('change', show);
      removeEventListener('beforeprint', paper);
      removeEventListener('afterprint', show);
    },
  };
}
