import { createStore, useStore } from '../lib/store';

export const themeChoices = ['day', 'night', 'system'] as const;
export type ThemeChoice = (typeof themeChoices)[number];

const storageKey = 'masswright.theme';
const darkPreferred = '(prefers-color-scheme: dark)';

function readChoice(): ThemeChoice {
  try {
    const stored = localStorage.getItem(storageKey);
    return themeChoices.find((choice) => choice === stored) ?? 'system';
  } catch {
    return 'system';
  }
}

/** The same rule as public/theme.js, which sets the first paint. */
export function computeTheme(choice: ThemeChoice, systemIsDark: boolean): 'day' | 'night' {
  if (choice === 'system') return systemIsDark ? 'night' : 'day';
  return choice;
}

const choice = createStore<ThemeChoice>('system');

function paint(): void {
  document.documentElement.dataset['theme'] = computeTheme(choice.get(), matchMedia(darkPreferred).matches);
}

/** Keeps the page in the chosen theme, also when the system or another tab changes it. */
export function startTheme(): void {
  choice.set(readChoice());
  choice.subscribe(paint);
  matchMedia(darkPreferred).addEventListener('change', paint);
  addEventListener('storage', (event) => {
    if (event.key === storageKey) choice.set(readChoice());
  });
  paint();
}

export function chooseTheme(chosen: ThemeChoice): void {
  try {
    localStorage.setItem(storageKey, chosen);
  } catch {
    // Not kept, but it holds for this page.
  }
  choice.set(chosen);
}

export const useThemeChoice = (): ThemeChoice => useStore(choice);
