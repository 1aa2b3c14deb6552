import { useState } from 'react';
import { chooseTheme, chosenTheme, type Theme } from '../lib/theme.ts';

const next: Record<Theme, Theme> = { system: 'light', light: 'dark', dark: 'system' };
const names: Record<Theme, string> = { system: 'as the system', light: 'light', dark: 'dark' };

/** One button through the three settings; its name tells the one in force and the one to come. */
export function ThemeSwitch() {
  const [theme, setTheme] = useState<Theme>(chosenTheme);
  function change() {
    chooseTheme(next[theme]);
    setTheme(next[theme]);
  }
  const label = `Paper: ${names[theme]}. Change to ${names[next[theme]]}`;
  return (
    <button
      type="button"
      onClick={change}
      aria-label={label}
      title={label}
      className="grid size-8 place-items-center rounded-box text-ink-2 hover:text-ink"
    >
      <svg
        viewBox="0 0 20 20"
        className="size-5"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.4"
        aria-hidden="true"
      >
        <rect x="3" y="3" width="14" height="14" rx="1.5" />
        {theme === 'system' && <path d="M3 17 17 3v12.500a1.5 1.5 0 0 1-1.5 1.500z" fill="currentColor" />}
        {theme === 'dark' && <rect x="3" y="3" width="14" height="14" rx="1.5" fill="currentColor" />}
        {theme === 'light' && <path d="M6.5 7h7M6.5 10h7M6.5 13h4" />}
      </svg>
    </button>
  );
}
