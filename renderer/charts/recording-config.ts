import type { ChartConfiguration } from 'chart.js';
import type { RecordingFigure } from '../../shared-core/diagnosis/figures.ts';
import { lineLabel } from '../../shared-core/report/line-label.ts';
import { axis, baseOptions, padded, tickText } from './base-options.ts';
import { lowerBound, visibleCurve } from './envelope.ts';
import type { Palette } from './palette.ts';
import type { RecordingMarks } from './recording-marks.ts';
import type { ViewRange } from './view-range.ts';

export interface RecordingChartInput {
  readonly figure: RecordingFigure;
  readonly range: ViewRange;
  readonly isLog: boolean;
  readonly palette: Palette;
  /** Width of the drawing, CSS pixels: at most two points are drawn on each. */
  readonly widthPx: number;
}

/** The whole recording, or the part of it that is zoomed into. */
export function recordingConfig(input: RecordingChartInput): ChartConfiguration<'line'> {
  const { figure, range, palette } = input;
  const points = visibleCurve(figure.wavelengthNm, figure.signal, {
    fromX: range.fromNm,
    toX: range.toNm,
    columnCount: Math.max(100, Math.round(input.widthPx)),
  });
  const y = input.isLog ? logRange(figure, range) : linearRange(figure, range);
  // On a logarithmic axis there is no place for zero: what lies below the floor is drawn on the floor.
  const drawn = input.isLog ? points.map((point) => ({ x: point.x, y: Math.max(point.y, y.min) })) : points;
  const unit = figure.signalUnit === 'counts' ? 'counts less dark' : 'signal less dark';
  const options = baseOptions();
  return {
    type: 'line',
    data: {
      datasets: [
        {
          data: drawn,
          borderColor: palette.data,
          borderWidth: 1,
          pointRadius: 0,
          pointHitRadius: 0,
          tension: 0,
        },
      ],
    },
    options: {
      ...options,
      plugins: { ...options.plugins, recordingMarks: marksOf(figure, palette) },
      scales: {
        x: {
          ...axis(palette, 'wavelength, nm (registered axis)'),
          type: 'linear',
          min: range.fromNm,
          max: range.toNm,
          ticks: {
            ...axis(palette, null).ticks,
            includeBounds: false,
            callback: (value) => tickText(Number(value)),
          },
        },
        y: {
          ...axis(palette, unit),
          type: input.isLog ? 'logarithmic' : 'linear',
          ...y,
          ticks: {
            ...axis(palette, null).ticks,
            includeBounds: false,
            callback: (value) => (input.isLog ? powerText(Number(value)) : tickText(Number(value))),
          },
        },
      },
    },
  };
}

/** Room above the highest peak for the names of the lines. */
const headroom = 0.16;

function linearRange(figure: RecordingFigure, range: ViewRange): { min: number; max: number } {
  const { low, high } = extremes(figure, range);
  return padded(Math.min(low, 0), high, 0.03, headroom);
}

/** From a third of the quiet noise up: below it a logarithm shows nothing but chance. */
function logRange(figure: RecordingFigure, range: ViewRange): { min: number; max: number } {
  const { high } = extremes(figure, range);
  const quiet = Float64Array.from(figure.sigma).sort()[figure.sigma.length >> 1] ?? 1;
  const min = Math.max(quiet / 3, Number.MIN_VALUE);
  const max = Math.max(high, 10 * min);
  return { min, max: min * Math.pow(max / min, 1 + headroom) };
}

function extremes(figure: RecordingFigure, range: ViewRange): { low: number; high: number } {
  const from = lowerBound(figure.wavelengthNm, range.fromNm);
  const to = Math.max(from + 1, lowerBound(figure.wavelengthNm, range.toNm));
  let low = Infinity;
  let high = -Infinity;
  for (const value of figure.signal.subarray(from, to)) {
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  return high >= low ? { low, high } : { low: 0, high: 1 };
}

/** Only the whole powers of ten get a number. */
function powerText(value: number): string {
  const power = Math.log10(value);
  return Math.abs(power - Math.round(power)) < 1e-6 ? tickText(value) : '';
}

function marksOf(figure: RecordingFigure, palette: Palette): RecordingMarks {
  const clippedNm: number[] = [];
  figure.clipped.forEach((flag, index) => {
    if (flag === 1) clippedNm.push(figure.wavelengthNm[index] ?? 0);
  });
  return {
    windows: figure.windows.map(({ fromNm, toNm }) => ({ fromNm, toNm })),
    ticks: figure.marks.map((mark) => ({
      atNm: mark.wavelengthNm,
      name: lineLabel(mark.lineId),
      isUsed: mark.used,
    })),
    clippedNm,
    palette,
  };
}
