export type Theme = 'system' | 'light' | 'dark';

// The same key is read by public/theme.js before the first paint.
const STORAGE_KEY = 'scruple.theme';

export function chosenTheme(): Theme {
  const set = document.documentElement.dataset.theme;
  return set === 'light' || set === 'dark' ? set : 'system';
}

export function chooseTheme(theme: Theme): void {
  if (theme === 'system') delete document.documentElement.dataset.theme;
  else document.documentElement.dataset.theme = theme;
  try {
    if (theme === 'system') window.localStorage.removeItem(STORAGE_KEY);
    else window.localStorage.setItem(STORAGE_KEY, theme);
  } catch {
    // Storage may be switched off: the choice then lasts until the page is left.
  }
}
