import type { ChartOptions, ScaleOptionsByType } from 'chart.js';
import { chartFont, type Palette } from './palette.ts';

type LinearScale = ScaleOptionsByType<'linear'>;

/** What every chart here has in common: no motion, no legend, points we prepared ourselves. */
export function baseOptions(): ChartOptions<'line'> {
  return {
    animation: false,
    parsing: false,
    normalized: true,
    responsive: true,
    maintainAspectRatio: false,
    events: [],
    layout: { padding: 0 },
    plugins: { legend: { display: false }, tooltip: { enabled: false } },
  };
}

/** An axis with a stated range, quantity and unit. */
export function axis(palette: Palette, title: string | null, size = 12) {
  return {
    title: {
      display: title !== null,
      text: title ?? '',
      color: palette.muted,
      font: { family: chartFont, size },
      padding: 0,
    },
    grid: { color: palette.rule, lineWidth: 0.5, tickLength: 4 },
    border: { color: palette.muted },
    ticks: {
      color: palette.muted,
      font: { family: chartFont, size },
      maxRotation: 0,
      sampleSize: 5,
      padding: 3,
      autoSkipPadding: 14,
    },
  } satisfies DeepPartial<LinearScale>;
}

type DeepPartial<T> = T extends object ? { [K in keyof T]?: DeepPartial<T[K]> } : T;

/** Tick text: thin spaces between thousands from 10 000 on, a true minus sign. */
export function tickText(value: number): string {
  const text = String(Number(value.toPrecision(10)));
  const [whole = '', fraction] = text.replace('-', '').split('.');
  if (/e/.test(text)) return text.replace('-', '−');
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, '\u2009') : whole;
  return (value < 0 ? '−' : '') + grouped + (fraction === undefined ? '' : `.${fraction}`);
}

/** A range widened by a share of itself on either side; never of zero width. */
export function padded(
  low: number,
  high: number,
  shareBelow: number,
  shareAbove: number,
): { min: number; max: number } {
  const span = high > low ? high - low : Math.max(1e-9, Math.abs(high) * 0.1, 1e-9);
  return { min: low - span * shareBelow, max: high + span * shareAbove };
}
