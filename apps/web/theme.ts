import { useSyncExternalStore } from 'react';

/** Light as paper or dark as a control room at night; the reader's choice wins over the machine's. */
export type Theme = 'light' | 'dark';

const KEY = 'varwright:theme';
const MACHINE = window.matchMedia('(prefers-color-scheme: dark)');
const listeners = new Set<() => void>();

export function theme(): Theme {
  const chosen = localStorage.getItem(KEY);
  if (chosen === 'light' || chosen === 'dark') return chosen;
  return MACHINE.matches ? 'dark' : 'light';
}

/** Puts the theme on the page, and keeps it there where the machine's changes or another window chooses. */
export function followTheme(): void {
  applyTheme();
  MACHINE.addEventListener('change', applyTheme);
  addEventListener('storage', applyTheme);
}

export function chooseTheme(chosen: Theme): void {
  localStorage.setItem(KEY, chosen);
  applyTheme();
}

function applyTheme(): void {
  document.documentElement.dataset.theme = theme();
  for (const listener of listeners) listener();
}

/** The theme, followed. */
export function useTheme(): Theme {
  return useSyncExternalStore((changed) => {
    listeners.add(changed);
    return () => listeners.delete(changed);
  }, theme);
}
