/** Colours of the charts, one set a theme; the style sheets hold the same ground colours. */
export interface Palette {
  readonly ground: string;
  readonly ink: string;
  readonly muted: string;
  readonly rule: string;
  readonly accent: string;
  /** Recorded data. */
  readonly data: string;
  /** Fitted curves and the straight line. */
  readonly model: string;
  /** Band of uncertainty, fitted window. */
  readonly band: string;
  readonly window: string;
  /** Clipped pixels and whatever else must not be missed. */
  readonly alarm: string;
}

export type ThemeName = 'paper' | 'dim lab';

/**
 * Series colours are from the colour-blind-safe set of Okabe and Ito: M. Okabe and K. Ito, Color Universal
 * Design (2008). On paper those that reach 3:1 against the ground; in the dim lab those with little blue.
 */
export const palettes: Readonly<Record<ThemeName, Palette>> = {
  paper: {
    ground: '#fbfaf7',
    ink: '#1c2024',
    muted: '#585f67',
    rule: '#d9d6ce',
    accent: '#0b6e69',
    data: '#1c2024',
    model: '#0072b2',
    band: 'rgba(0, 114, 178, 0.16)',
    window: 'rgba(11, 110, 105, 0.11)',
    alarm: '#d55e00',
  },
  'dim lab': {
    ground: '#14110f',
    ink: '#e9dccb',
    muted: '#a99a88',
    rule: '#3a332c',
    accent: '#e0914a',
    data: '#e9dccb',
    model: '#e69f00',
    band: 'rgba(230, 159, 0, 0.2)',
    window: 'rgba(224, 145, 74, 0.15)',
    alarm: '#f0703a',
  },
};

export const chartFont = "'Source Sans 3', sans-serif";
