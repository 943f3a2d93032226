import { useSyncExternalStore } from 'react';

export const THEME_CHOICES = ['light', 'dark', 'system'] as const;
export type ThemeChoice = (typeof THEME_CHOICES)[number];
export type Appearance = 'light' | 'dark';

// public/theme-boot.js reads the same key before the first paint.
const STORAGE_KEY = 'benchlark.theme';
const DARK_QUERY = '(prefers-color-scheme: dark)';
const listeners = new Set<() => void>();
let chosen: ThemeChoice = readStoredChoice();
/** Paper is light: while a page is printed the theme is too. */
let isPrinting = false;

function readStoredChoice(): ThemeChoice {
  try {
    const stored = localStorage.getItem(STORAGE_KEY);
    return THEME_CHOICES.find((choice) => choice === stored) ?? 'system';
  } catch {
    return 'system'; // storage is forbidden: the system decides
  }
}

function resolveAppearance(choice: ThemeChoice): Appearance {
  if (isPrinting) return 'light';
  if (choice !== 'system') return choice;
  return matchMedia(DARK_QUERY).matches ? 'dark' : 'light';
}

/** Puts the class on html, so that the page outside Radix's root and its portals agree. */
function apply(): void {
  const appearance = resolveAppearance(chosen);
  document.documentElement.classList.toggle('dark', appearance === 'dark');
  document.documentElement.classList.toggle('light', appearance === 'light');
  for (const listener of listeners) listener();
}

export function setThemeChoice(choice: ThemeChoice): void {
  chosen = choice;
  try {
    localStorage.setItem(STORAGE_KEY, choice);
  } catch {
    chosen = choice; // lasts until the page is left, when nothing may be stored
  }
  apply();
}

function subscribe(listener: () => void): () => void {
  const system = matchMedia(DARK_QUERY);
  const onStorage = (event: StorageEvent) => {
    if (event.key !== STORAGE_KEY) return;
    chosen = readStoredChoice();
    apply();
  };
  const onBeforePrint = () => {
    isPrinting = true;
    apply();
  };
  const onAfterPrint = () => {
    isPrinting = false;
    apply();
  };
  listeners.add(listener);
  window.addEventListener('beforeprint', onBeforePrint);
  window.addEventListener('afterprint', onAfterPrint);
  system.addEventListener('change', apply);
  window.addEventListener('storage', onStorage);
  return () => {
    listeners.delete(listener);
    window.removeEventListener('beforeprint', onBeforePrint);
    window.removeEventListener('afterprint', onAfterPrint);
    system.removeEventListener('change', apply);
    window.removeEventListener('storage', onStorage);
  };
}

/** The theme a person chose and the one it comes to now. */
export function useTheme(): {
  choice: ThemeChoice;
  appearance: Appearance;
  setChoice: (choice: ThemeChoice) => void;
} {
  const choice = useSyncExternalStore(subscribe, () => chosen);
  const appearance = useSyncExternalStore(subscribe, () => resolveAppearance(chosen));
  return { choice, appearance, setChoice: setThemeChoice };
}
