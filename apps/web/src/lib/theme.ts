import { useSyncExternalStore } from 'react';

export type Theme = 'paper' | 'night';
export type ThemeChoice = Theme | 'system';

/** The same name as in public/theme.js, which sets the theme before the first paint. */
const storageKey = 'nightcone.theme';
const listeners = new Set<() => void>();
const darkSystem = () => matchMedia('(prefers-color-scheme: dark)');

function readChoice(): ThemeChoice {
  try {
    const kept = localStorage.getItem(storageKey);
    return kept === 'paper' || kept === 'night' ? kept : 'system';
  } catch {
    return 'system';
  }
}

function apply() {
  const choice = readChoice();
  document.documentElement.dataset.theme = choice === 'system' ? (darkSystem().matches ? 'night' : 'paper') : choice;
  for (const listener of listeners) listener();
}

export function chooseTheme(choice: ThemeChoice): void {
  try {
    if (choice === 'system') localStorage.removeItem(storageKey);
    else localStorage.setItem(storageKey, choice);
  } catch {
    // Without storage the choice lasts as long as the page.
    if (choice !== 'system') document.documentElement.dataset.theme = choice;
    for (const listener of listeners) listener();
    return;
  }
  apply();
}

/** Follows the system and the other tabs. Called once. */
export function watchTheme(): void {
  darkSystem().addEventListener('change', apply);
  window.addEventListener('storage', (event) => event.key === storageKey && apply());
}

function subscribe(listener: () => void) {
  listeners.add(listener);
  return () => listeners.delete(listener);
}
/** The theme on screen; canvas drawings redraw with it. */
export const useTheme = (): Theme =>
  useSyncExternalStore(subscribe, () => (document.documentElement.dataset.theme === 'night' ? 'night' : 'paper'));
export const useThemeChoice = (): ThemeChoice => useSyncExternalStore(subscribe, readChoice);
