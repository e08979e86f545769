import { createContext, useContext, useEffect, useState } from 'react';
import { type Palette, palettes, type ThemeName } from '../charts/palette.ts';

export type ThemeChoice = 'as the system' | ThemeName;

export const themeChoices: readonly ThemeChoice[] = ['as the system', 'paper', 'dim lab'];

const storageKey = 'lampwright.theme';
const systemIsDark = (): MediaQueryList => matchMedia('(prefers-color-scheme: dark)');

/** The theme in force, and the person's choice, kept for the next start. */
export function useTheme(): {
  readonly theme: ThemeName;
  readonly choice: ThemeChoice;
  readonly choose: (choice: ThemeChoice) => void;
} {
  const [choice, setChoice] = useState(storedChoice);
  const [isDark, setIsDark] = useState(() => systemIsDark().matches);
  const theme: ThemeName = choice !== 'as the system' ? choice : isDark ? 'dim lab' : 'paper';

  useEffect(() => {
    const media = systemIsDark();
    const follow = (event: MediaQueryListEvent): void => setIsDark(event.matches);
    media.addEventListener('change', follow);
    return () => media.removeEventListener('change', follow);
  }, []);

  useEffect(() => {
    document.documentElement.dataset['theme'] = theme.replace(' ', '-');
  }, [theme]);

  const choose = (chosen: ThemeChoice): void => {
    setChoice(chosen);
    try {
      localStorage.setItem(storageKey, chosen);
    } catch {
      // A browser that keeps nothing still shows the chosen theme until it is closed.
    }
  };
  return { theme, choice, choose };
}

function storedChoice(): ThemeChoice {
  try {
    const stored = localStorage.getItem(storageKey);
    return themeChoices.find((choice) => choice === stored) ?? 'as the system';
  } catch {
    return 'as the system';
  }
}

export const PaletteContext = createContext<Palette>(palettes.paper);
export const usePalette = (): Palette => useContext(PaletteContext);
