import { useSyncExternalStore } from 'react';
import { applyTheme, schemes, type Scheme } from '@/constants/theme';

export const themeChoices = ['system', ...schemes] as const;
export type ThemeChoice = (typeof themeChoices)[number];

const storageKey = 'driftless-theme';
const prefersDark = '(prefers-color-scheme: dark)';

const listeners = new Set<() => void>();

function readChoice(): ThemeChoice {
  const kept = window.localStorage.getItem(storageKey);
  return themeChoices.find((choice) => choice === kept) ?? 'system';
}

function schemeOf(choice: ThemeChoice): Scheme {
  if (choice !== 'system') return choice;
  return window.matchMedia(prefersDark).matches ? 'dark' : 'light';
}

const repaint = () => applyTheme(schemeOf(readChoice()));

/** Paints the page in the chosen scheme, and again whenever the device changes its own. */
export function startTheme(): void {
  repaint();
  window.matchMedia(prefersDark).addEventListener('change', repaint);
}

function chooseTheme(choice: ThemeChoice) {
  window.localStorage.setItem(storageKey, choice);
  repaint();
  for (const listener of listeners) listener();
}

const subscribe = (listener: () => void) => {
  listeners.add(listener);
  return () => listeners.delete(listener);
};

export function useTheme() {
  return { choice: useSyncExternalStore(subscribe, readChoice), chooseTheme };
}
