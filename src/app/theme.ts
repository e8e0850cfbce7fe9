import type { Theme } from '@shared/schemas/api';

const KEY = 'seamwright-theme';

/** Puts the theme on the page; remembered on this device so that the next start is not in the wrong one. */
export function applyTheme(theme: Theme): void {
  if (theme === 'system') delete document.documentElement.dataset.theme;
  else document.documentElement.dataset.theme = theme;
  try {
    localStorage.setItem(KEY, theme);
  } catch {
    // a browser that keeps nothing still shows the right theme once the person is known
  }
}

/** The theme this device had last, before anybody is known. */
export function rememberedTheme(): Theme {
  try {
    const kept = localStorage.getItem(KEY);
    return kept === 'light' || kept === 'dark' ? kept : 'system';
  } catch {
    return 'system';
  }
}
