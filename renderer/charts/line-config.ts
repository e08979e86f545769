import type { ChartConfiguration } from 'chart.js';
import type { LineFigure } from '../../shared-core/diagnosis/figures.ts';
import { axis, baseOptions, padded, tickText } from './base-options.ts';
import type { ChartPoint } from './envelope.ts';
import { chartFont, type Palette } from './palette.ts';

/** Residuals beyond this are drawn on the edge of their strip, as a filled point. */
const maxResidual = 5;

/** One line: points with error bars and the fitted curve, and below it the residuals in units of sigma. */
export function lineConfig(figure: LineFigure, palette: Palette): ChartConfiguration<'line'> {
  const x = figure.wavelengthNm;
  const first = x[0] ?? 0;
  const last = x.at(-1) ?? 1;
  const isClipped = (index: number): boolean => figure.clipped[index] === 1;
  const indices = [...x.keys()];
  const kept = indices.filter((index) => !isClipped(index));
  const clipped = indices.filter(isClipped);
  const at =
    (values: Float64Array) =>
    (index: number): ChartPoint => ({ x: x[index] ?? 0, y: values[index] ?? 0 });
  const residuals = kept.map(at(figure.residualSigma));
  const y = yRange(figure);
  const reach = residualReach(residuals);
  const options = baseOptions();
  const small = 11;
  return {
    type: 'line',
    data: {
      datasets: [
        {
          data: [...figure.curveNm].map((nm, k) => ({ x: nm, y: figure.curve[k] ?? 0 })),
          borderColor: palette.model,
          borderWidth: 1.5,
          pointRadius: 0,
          yAxisID: 'y',
          order: 2,
        },
        {
          data: indices.map(at(figure.baseline)),
          borderColor: palette.model,
          borderWidth: 1,
          borderDash: [3, 3],
          pointRadius: 0,
          yAxisID: 'y',
          order: 3,
        },
        dots(kept.map(at(figure.signal)), palette.data, 'circle', 1.6),
        dots(clipped.map(at(figure.signal)), palette.alarm, 'triangle', 3.5, 180),
        {
          ...dots(
            residuals.map((point) => ({ x: point.x, y: Math.min(reach, Math.max(-reach, point.y)) })),
            palette.data,
            'circle',
            1.4,
          ),
          yAxisID: 'residual',
        },
      ],
    },
    options: {
      ...options,
      layout: { padding: { top: 2, right: 4 } },
      plugins: {
        ...options.plugins,
        errorBars: {
          bars: kept.map((index) => ({
            ...at(figure.signal)(index),
            sigma: figure.sigma[index] ?? 0,
            color: palette.data,
          })),
          arrows: [],
          names: [],
          font: `11px ${chartFont}`,
          capPx: 0,
        },
      },
      scales: {
        x: {
          ...axis(palette, null, small),
          type: 'linear',
          min: first,
          max: last,
          ticks: {
            ...axis(palette, null, small).ticks,
            stepSize: roundStep(last - first),
            includeBounds: false,
            callback: (v) => tickText(Number(v)),
          },
        },
        // Stacked axes stand from the bottom up in the order in which they are named.
        residual: {
          ...axis(palette, 'resid. σ', small),
          type: 'linear',
          axis: 'y',
          position: 'left',
          min: -reach,
          max: reach,
          stack: 'line',
          stackWeight: 1.15,
          offset: false,
          grid: {
            lineWidth: (context) => (context.tick.value === 0 ? 1 : 0.5),
            color: (context) => (context.tick.value === 0 ? palette.muted : palette.rule),
          },
          ticks: {
            ...axis(palette, null, small).ticks,
            stepSize: reach,
            autoSkip: false,
            // The upper end stands against the lower end of the plot above; its size is that of the lower end.
            callback: (v) => (Number(v) > 0 ? '' : tickText(Number(v))),
          },
        },
        y: {
          ...axis(palette, null, small),
          type: 'linear',
          ...y,
          position: 'left',
          stack: 'line',
          stackWeight: 3,
          ticks: {
            ...axis(palette, null, small).ticks,
            maxTicksLimit: 4,
            includeBounds: false,
            callback: (v) => shortText(Number(v)),
          },
        },
      },
    },
  };
}

function dots(
  data: ChartPoint[],
  color: string,
  pointStyle: 'circle' | 'triangle',
  pointRadius: number,
  pointRotation = 0,
) {
  return {
    data,
    showLine: false,
    pointStyle,
    pointRadius,
    pointRotation,
    pointBackgroundColor: color,
    pointBorderColor: color,
    borderColor: color,
    borderWidth: 0,
    yAxisID: 'y',
    order: 1,
  };
}

function yRange(figure: LineFigure): { min: number; max: number } {
  let low = Infinity;
  let high = -Infinity;
  for (const values of [figure.signal, figure.curve, figure.baseline]) {
    for (const value of values) {
      low = Math.min(low, value);
      high = Math.max(high, value);
    }
  }
  return high >= low ? padded(low, high, 0.08, 0.1) : { min: 0, max: 1 };
}

/** 3 sigma when all is well, else as far as the residuals go, up to a limit. */
function residualReach(residuals: readonly ChartPoint[]): number {
  const largest = residuals.reduce((most, point) => Math.max(most, Math.abs(point.y)), 0);
  return largest <= 3 ? 3 : maxResidual;
}

/** A round step that gives a small axis two to four numbers. */
export function roundStep(span: number): number {
  const steps = [0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10, 20, 50];
  return steps.find((step) => span / step < 4) ?? 100;
}

/** Large counts in thousands: a small chart has no room for six digits. */
export function shortText(value: number): string {
  const size = Math.abs(value);
  if (size >= 1e6) return `${tickText(value / 1e6)}M`;
  return size >= 10_000 ? `${tickText(value / 1000)}k` : tickText(value);
}
