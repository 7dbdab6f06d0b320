import { useSyncExternalStore } from 'react';

export type ThemeChoice = 'system' | 'light' | 'dark' | 'sun';
export type Theme = Exclude<ThemeChoice, 'system'>;

export const THEME_CHOICES: readonly ThemeChoice[] = ['system', 'light', 'dark', 'sun'];

const KEY = 'saltmark.theme';
const listeners = new Set<() => void>();

/** What the person chose on this device. public/theme.js applies the same rule before the first paint. */
export function readThemeChoice(): ThemeChoice {
  try {
    const stored = localStorage.getItem(KEY);
    return THEME_CHOICES.find((choice) => choice === stored) ?? 'system';
  } catch {
    // Storage may be switched off; the system's own choice is right then.
    return 'system';
  }
}

export function chooseTheme(choice: ThemeChoice): void {
  try {
    if (choice === 'system') localStorage.removeItem(KEY);
    else localStorage.setItem(KEY, choice);
  } catch {
    // The choice then lasts until the page is closed.
  }
  applyTheme(choice);
}

/** Follow the system while nothing else is chosen. Returns the way to stop. */
export function watchSystemTheme(): () => void {
  const query = window.matchMedia('(prefers-color-scheme: dark)');
  const follow = () => applyTheme(readThemeChoice());
  query.addEventListener('change', follow);
  return () => query.removeEventListener('change', follow);
}

/** The theme on screen now; charts on canvas read their colours again when it changes. */
export function useTheme(): Theme {
  return useSyncExternalStore(subscribe, themeOnScreen);
}

export function useThemeChoice(): ThemeChoice {
  return useSyncExternalStore(subscribe, readThemeChoice);
}

function applyTheme(choice: ThemeChoice): void {
  const isDark = window.matchMedia('(prefers-color-scheme: dark)').matches;
  document.documentElement.dataset.theme = choice === 'system' ? (isDark ? 'dark' : 'light') : choice;
  for (const listener of listeners) listener();
}

function themeOnScreen(): Theme {
  const theme = document.documentElement.dataset.theme;
  return theme === 'dark' || theme === 'sun' ? theme : 'light';
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}
