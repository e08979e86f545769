import type { ChartConfiguration } from 'chart.js';
import type { PopulationFigure, PopulationPoint } from '../../shared-core/diagnosis/figures.ts';
import { lineLabel } from '../../shared-core/report/line-label.ts';
import { axis, baseOptions, padded, tickText } from './base-options.ts';
import type { ChartPoint } from './envelope.ts';
import { chartFont, type Palette } from './palette.ts';

type Drawn = PopulationPoint & { readonly lnPopulation: number };

const isDrawn = (point: PopulationPoint): point is Drawn => point.lnPopulation !== null;

/** ln(population) against level energy: points, the straight line with its band, left-out points hollow. */
export function populationConfig(figure: PopulationFigure, palette: Palette): ChartConfiguration<'line'> {
  const points = figure.points.filter(isDrawn);
  const measured = points.filter((point) => !point.isUpperLimit);
  const used = measured.filter((point) => point.used);
  const leftOut = measured.filter((point) => !point.used);
  const limits = points.filter((point) => point.isUpperLimit);
  const place = (point: Drawn): ChartPoint => ({ x: point.upperEnergyEv, y: point.lnPopulation });
  const line = figure.line;
  const curve = (values: Float64Array | undefined): ChartPoint[] =>
    line === null || values === undefined
      ? []
      : [...line.energyEv].map((energy, k) => ({ x: energy, y: values[k] ?? 0 }));
  const options = baseOptions();
  const noDots = { pointRadius: 0, borderWidth: 0, order: 3 } as const;
  return {
    type: 'line',
    data: {
      datasets: [
        { data: curve(line?.low), ...noDots },
        { data: curve(line?.high), ...noDots, fill: '-1', backgroundColor: palette.band },
        {
          data: curve(line?.lnPopulation),
          borderColor: palette.model,
          borderWidth: 2,
          pointRadius: 0,
          order: 2,
        },
        dots(used.map(place), palette.data, palette.data),
        dots(leftOut.map(place), palette.muted, palette.ground),
      ],
    },
    options: {
      ...options,
      layout: { padding: { top: 4, right: 8 } },
      plugins: {
        ...options.plugins,
        errorBars: {
          bars: measured.map((point) => ({
            ...place(point),
            sigma: point.lnPopulationSigma ?? 0,
            color: point.used ? palette.data : palette.muted,
          })),
          arrows: limits.map((point) => ({ ...place(point), color: palette.muted })),
          names: points.map((point) => ({
            ...place(point),
            text: lineLabel(point.lineId),
            color: point.used ? palette.ink : palette.muted,
          })),
          font: `13px ${chartFont}`,
          capPx: 3,
        },
      },
      scales: {
        x: {
          ...axis(palette, 'energy of the upper level, eV'),
          type: 'linear',
          ...energyRange(points),
          ticks: {
            ...axis(palette, null).ticks,
            includeBounds: false,
            callback: (value) => tickText(Number(value)),
          },
        },
        y: {
          ...axis(palette, 'ln(population ∕ weight), relative'),
          type: 'linear',
          ...populationRange(points, figure),
          ticks: {
            ...axis(palette, null).ticks,
            includeBounds: false,
            callback: (value) => tickText(Number(value)),
          },
        },
      },
    },
  };
}

function dots(data: ChartPoint[], border: string, fill: string) {
  return {
    data,
    showLine: false,
    pointRadius: 4.5,
    pointBackgroundColor: fill,
    pointBorderColor: border,
    pointBorderWidth: 1.5,
    order: 1,
  };
}

function energyRange(points: readonly Drawn[]): { min: number; max: number } {
  const energies = points.map((point) => point.upperEnergyEv);
  return energies.length === 0
    ? { min: 12, max: 13.6 }
    : padded(Math.min(...energies), Math.max(...energies), 0.06, 0.1);
}

/** Holds the points with their bars and the line; the band may leave it where it fans out. */
function populationRange(points: readonly Drawn[], figure: PopulationFigure): { min: number; max: number } {
  const values = points.flatMap((point) => {
    const sigma = point.lnPopulationSigma ?? 0;
    return [point.lnPopulation - sigma, point.lnPopulation + sigma];
  });
  const all = [...values, ...(figure.line?.lnPopulation ?? [])].filter(Number.isFinite);
  return all.length === 0 ? { min: -1, max: 1 } : padded(Math.min(...all), Math.max(...all), 0.12, 0.12);
}
