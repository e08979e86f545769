import { ink, dashes } from './chart-style.ts';
import { formatAtPlace, mantissaAt, powerOfTen } from '../text/format-number.ts';
import { niceTicks, type Ticks } from './nice-ticks.ts';
import { coordinate, element, polyline, textElement } from './svg.ts';

export interface PlotArea {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

export interface AxisSpec {
  /** Ends in the unit of the axis, low < high. */
  readonly low: number;
  readonly high: number;
  readonly label: string;
  readonly tickCount: number;
  /** False for the upper of two panels that share an axis. */
  readonly hasTickLabels?: boolean;
}

export interface Plot {
  readonly area: PlotArea;
  /** Horizontal position of a value, user units. */
  readonly xAt: (value: number) => number;
  readonly yAt: (value: number) => number;
  /** Rules and grid, to lie below the data. */
  readonly background: string;
  /** Frame, ticks and labels, to lie above the data. */
  readonly frame: string;
}

/** Lays out a plot with linear axes, ticks outside, light grid. */
export function linearPlot(area: PlotArea, x: AxisSpec, y: AxisSpec): Plot {
  const xAt = (value: number) => area.left + ((value - x.low) / (x.high - x.low)) * area.width;
  const yAt = (value: number) => area.top + area.height - ((value - y.low) / (y.high - y.low)) * area.height;
  const xTicks = niceTicks(x.low, x.high, x.tickCount);
  const yTicks = niceTicks(y.low, y.high, y.tickCount);
  const bottom = area.top + area.height;
  const right = area.left + area.width;
  const grid = [
    ...yTicks.values.map((value) => polyline([[area.left, yAt(value)], [right, yAt(value)]])), // prettier-ignore
    ...xTicks.values.map((value) => polyline([[xAt(value), area.top], [xAt(value), bottom]])), // prettier-ignore
  ].join('');
  const marks = [
    ...yTicks.values.map((value) => polyline([[area.left - 3, yAt(value)], [area.left, yAt(value)]])), // prettier-ignore
    ...xTicks.values.map((value) => polyline([[xAt(value), bottom], [xAt(value), bottom + 3]])), // prettier-ignore
    `M${coordinate(area.left)} ${coordinate(area.top)}V${coordinate(bottom)}H${coordinate(right)}`,
  ].join('');
  const yLabels = tickLabels(yTicks);
  const xLabels = tickLabels(xTicks);
  const texts = [
    ...yTicks.values.map((value, index) =>
      textElement(yLabels.texts[index] ?? '', {
        x: area.left - 5,
        y: yAt(value) + 3.2,
        'text-anchor': 'end',
        fill: ink.muted,
      }),
    ),
    verticalLabel(y.label + yLabels.factor, area),
  ];
  if (x.hasTickLabels !== false)
    texts.push(
      ...xTicks.values.map((value, index) =>
        textElement(xLabels.texts[index] ?? '', {
          x: xAt(value),
          y: bottom + 13,
          'text-anchor': 'middle',
          fill: ink.muted,
        }),
      ),
      textElement(x.label + xLabels.factor, {
        x: area.left + area.width / 2,
        y: bottom + 26,
        'text-anchor': 'middle',
        fill: ink.text,
      }),
    );
  return {
    area,
    xAt,
    yAt,
    background: element('path', { d: grid, stroke: ink.rule, 'stroke-width': 0.5, fill: 'none' }),
    frame:
      element('path', { d: marks, stroke: ink.axis, 'stroke-width': 0.8, fill: 'none' }) + texts.join(''),
  };
}

/** Markup cut off at the edges of the plot. */
export function clippedTo(area: PlotArea, ...children: readonly string[]): string {
  const { left, top, width, height } = area;
  const box = [left, top, width, height].map(coordinate).join(' ');
  return element('svg', { x: left, y: top, width, height, viewBox: box, overflow: 'hidden' }, ...children);
}

/** A dashed level across the plot. */
export function levelLine(plot: Plot, value: number): string {
  const { left, width } = plot.area;
  const y = plot.yAt(value);
  return element('path', {
    d: polyline([
      [left, y],
      [left + width, y],
    ]),
    stroke: ink.axis,
    'stroke-width': 0.7,
    'stroke-dasharray': dashes.guide,
    fill: 'none',
  });
}

/** Ends of an axis with a margin on both sides; a single value gets a width of its own. */
export function paddedRange(
  values: Iterable<number>,
  margin: { readonly below: number; readonly above: number },
): { readonly low: number; readonly high: number } {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (!Number.isFinite(value)) continue;
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  if (low > high) return { low: 0, high: 1 };
  const span = high > low ? high - low : Math.abs(high) || 1;
  return { low: low - margin.below * span, high: high + margin.above * span };
}

/** Labels of one axis share a power of ten, taken out to the axis label when the numbers would be long. */
function tickLabels(ticks: Ticks): { readonly texts: readonly string[]; readonly factor: string } {
  const largest = Math.max(...ticks.values.map(Math.abs));
  const exponent = largest > 0 ? Number(largest.toExponential().split('e')[1]) : 0;
  if (exponent >= -4 && exponent <= 5)
    return { texts: ticks.values.map((value) => formatAtPlace(value, ticks.place)), factor: '' };
  return {
    texts: ticks.values.map((value) => mantissaAt(value, ticks.place, exponent, 'typographic')),
    factor: ` /${powerOfTen(exponent, 'typographic').replace('\u202f×\u202f', '\u202f')}`,
  };
}

function verticalLabel(label: string, area: PlotArea): string {
  const y = area.top + area.height / 2;
  return textElement(label, {
    x: 10,
    y,
    'text-anchor': 'middle',
    fill: ink.text,
    transform: `rotate(-90 10 ${coordinate(y)})`,
  });
}
