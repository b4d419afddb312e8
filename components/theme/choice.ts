import { useSyncExternalStore } from 'react';
import type { ThemeName } from './tokens.ts';

/** What the person chose: follow the system, or always the one or the other. */
export const themeChoices = ['system', 'light', 'night'] as const;
export type ThemeChoice = (typeof themeChoices)[number];

export const themeKey = 'cinderpath.theme';

const listeners = new Set<() => void>();

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  const dark = window.matchMedia('(prefers-color-scheme: dark)');
  dark.addEventListener('change', listener);
  window.addEventListener('storage', listener);
  return () => {
    listeners.delete(listener);
    dark.removeEventListener('change', listener);
    window.removeEventListener('storage', listener);
  };
}

function themeChoice(): ThemeChoice {
  const kept = readKept();
  return kept === 'light' || kept === 'night' ? kept : 'system';
}

/** Storage may be forbidden (private windows): then the system decides. */
function readKept(): string | null {
  try {
    return window.localStorage.getItem(themeKey);
  } catch {
    return null;
  }
}

function themeName(): ThemeName {
  const choice = themeChoice();
  if (choice !== 'system') return choice;
  return window.matchMedia('(prefers-color-scheme: dark)').matches ? 'night' : 'light';
}

/** Chooses the theme on this device. */
export function chooseTheme(choice: ThemeChoice): void {
  try {
    if (choice === 'system') window.localStorage.removeItem(themeKey);
    else window.localStorage.setItem(themeKey, choice);
  } catch {
    // Not kept then; it still holds for this page.
  }
  if (choice === 'system') delete document.documentElement.dataset.theme;
  else document.documentElement.dataset.theme = choice;
  for (const listener of listeners) listener();
}

/** What was chosen; 'system' until the page has mounted. */
export const useThemeChoice = (): ThemeChoice => useSyncExternalStore(subscribe, themeChoice, () => 'system');

/** What is seen; 'light' until the page has mounted (colours come by variable and are right before that). */
export const useThemeName = (): ThemeName => useSyncExternalStore(subscribe, themeName, () => 'light');
