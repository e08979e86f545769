import type { PopulationFigure, PopulationPoint } from '../diagnosis/figures.ts';
import { clippedTo, linearPlot, paddedRange, type Plot } from './chart-axes.ts';
import { dashes, ink } from './chart-style.ts';
import { formatAtPlace } from '../text/format-number.ts';
import { lineLabel } from './line-label.ts';
import { discs, errorBars, rings, upperLimitArrow } from './markers.ts';
import { element, figureRoot, polyline, textElement } from './svg.ts';

const width = 400;
const height = 256;
const area = { left: 50, top: 12, width: 340, height: 214 };

interface PlacedPoint {
  readonly point: PopulationPoint;
  readonly x: number;
  readonly y: number;
  readonly barHeight: number;
}

/** The population plot: ln(n/g) against upper energy, the straight line and its band; hollow points are left out. */
export function populationsSvg(figure: PopulationFigure, options: { readonly id: string }): string {
  const shown = figure.points.filter((point) => point.lnPopulation !== null);
  const plot = linearPlot(
    area,
    { ...energyRange(figure), label: 'upper energy / eV', tickCount: 6 },
    {
      ...paddedRange(ordinates(figure), { below: 0.08, above: 0.12 }),
      label: 'ln(n / g), relative',
      tickCount: 6,
    },
  );
  const placed = shown.map((point): PlacedPoint => {
    const ln = point.lnPopulation ?? 0;
    const sigma = point.lnPopulationSigma ?? 0;
    return {
      point,
      x: plot.xAt(point.upperEnergyEv),
      y: plot.yAt(ln),
      barHeight: Math.abs(plot.yAt(ln + sigma) - plot.yAt(ln)),
    };
  });
  return figureRoot(
    {
      id: options.id,
      width,
      height,
      title: 'Population plot',
      description: `${placed.map(({ point }) => spoken(point)).join('; ') || 'No populations'}. ${
        figure.line === null
          ? 'No line could be fitted.'
          : figure.verdict === 'not defensible'
            ? 'The straight line is not supported by the data.'
            : 'The straight line runs through the used points.'
      }`,
    },
    [plot.background, clippedTo(area, fitted(plot, figure), points(placed)), plot.frame, pointNames(placed)],
  );
}

function fitted(plot: Plot, figure: PopulationFigure): string {
  const { line } = figure;
  if (line === null) return '';
  const at = (ordinate: Float64Array) =>
    Array.from(
      line.energyEv,
      (ev, index) => [plot.xAt(ev), plot.yAt(ordinate[index] ?? Number.NaN)] as const,
    );
  const isSupported = figure.verdict !== 'not defensible';
  return [
    element('path', {
      d: `${polyline([...at(line.low), ...at(line.high).reverse()])}Z`,
      fill: ink.band,
      'fill-opacity': isSupported ? 0.28 : 0.12,
    }),
    element('path', {
      d: polyline(at(line.lnPopulation)),
      stroke: isSupported ? ink.model : ink.muted,
      'stroke-width': 1.4,
      fill: 'none',
      ...(isSupported ? {} : { 'stroke-dasharray': dashes.unsupported }),
    }),
  ].join('');
}

function points(placed: readonly PlacedPoint[]): string {
  const limits = placed.filter(({ point }) => point.isUpperLimit);
  const measured = placed.filter(({ point }) => !point.isUpperLimit);
  const centres = (used: boolean) =>
    measured.filter(({ point }) => point.used === used).map(({ x, y }): [number, number] => [x, y]);
  return [
    errorBars(
      measured
        .filter(({ barHeight }) => barHeight > 0)
        .map(({ x, y, barHeight }) => ({ x, y1: y - barHeight, y2: y + barHeight })),
      3,
    ),
    discs(centres(true), 3),
    rings(centres(false), 3),
    ...limits.map(({ x, y }) => upperLimitArrow(x, y)),
  ].join('');
}

/** Names beside the points, each at the first of several places where it covers no other name. */
function pointNames(placed: readonly PlacedPoint[]): string {
  const taken: { left: number; right: number; top: number; bottom: number }[] = placed.map(
    ({ x, y, barHeight }) => ({
      left: x - 3,
      right: x + 3,
      top: y - Math.max(3, barHeight),
      bottom: y + Math.max(3, barHeight),
    }),
  );
  return placed
    .map(({ point, x, y, barHeight }) => {
      const label = lineLabel(point.lineId);
      const text = label.length > 10 ? `${label.slice(0, 9)}…` : label;
      const half = text.length * 3.1;
      const above = y - Math.max(4, barHeight) - 5;
      const below = y + Math.max(4, barHeight) + (point.isUpperLimit ? 26 : 12);
      const candidates: [number, number][] = [
        [x + half + 6, y - 5],
        [x - half - 6, y + 11],
        [x, above],
        [x, below],
        [x, above - 11],
        [x, below + 11],
        [x, above - 22],
        [x, below + 22],
      ];
      const boxOf = ([cx, baseline]: [number, number]) => ({
        left: cx - half,
        right: cx + half,
        top: baseline - 9,
        bottom: baseline + 2,
      });
      const fits = (place: [number, number]) => {
        const box = boxOf(place);
        if (box.left < area.left || box.right > area.left + area.width || box.top < area.top) return false;
        if (box.bottom > area.top + area.height) return false;
        return taken.every(
          (other) =>
            box.right < other.left ||
            box.left > other.right ||
            box.bottom < other.top ||
            box.top > other.bottom,
        );
      };
      const place = candidates.find(fits) ?? [Math.min(x, area.left + area.width - half), above];
      taken.push(boxOf(place));
      return textElement(text, {
        x: place[0],
        y: place[1],
        'text-anchor': 'middle',
        fill: point.used ? ink.text : ink.muted,
        'font-weight': point.used ? 600 : 400,
      });
    })
    .join('');
}

function energyRange(figure: PopulationFigure): { readonly low: number; readonly high: number } {
  const energies = figure.points.map((point) => point.upperEnergyEv);
  return paddedRange([...energies, ...(figure.line?.energyEv ?? [])], { below: 0.04, above: 0.06 });
}

function* ordinates(figure: PopulationFigure): Generator<number> {
  for (const { lnPopulation, lnPopulationSigma } of figure.points) {
    if (lnPopulation === null) continue;
    yield lnPopulation - (lnPopulationSigma ?? 0);
    yield lnPopulation + (lnPopulationSigma ?? 0);
  }
  if (figure.line === null) return;
  yield* figure.line.low;
  yield* figure.line.high;
}

function spoken(point: PopulationPoint): string {
  const state = point.isUpperLimit ? 'upper limit' : point.used ? 'used' : 'left out';
  return `${lineLabel(point.lineId)} at ${formatAtPlace(point.upperEnergyEv, -2)} eV, ${state}`;
}
