import type { DiagnosedLine } from '../diagnosis/diagnosis.ts';
import type { LineFigure } from '../diagnosis/figures.ts';
import { clippedTo, levelLine, linearPlot, paddedRange, type Plot } from './chart-axes.ts';
import { dashes, ink } from './chart-style.ts';
import { formatAtPlace, formatSignificant } from '../text/format-number.ts';
import { lineLabel } from './line-label.ts';
import { crosses, discs, errorBars } from './markers.ts';
import { element, figureRoot, polyline, textElement } from './svg.ts';

const width = 222;
const height = 188;
const margins = { left: 52, right: 6, top: 20 };
const fitHeight = 94;
const stripHeight = 36;
const stripGap = 8;
/** The residual strip shows at least this many sigma on each side, and no more than the second number. */
const stripSigma = { least: 3.5, most: 12 };

/** One line: pixels with error bars, fitted profile and baseline, and below them the residuals in sigma. */
export function lineSvg(
  figure: LineFigure,
  line: DiagnosedLine | undefined,
  options: { readonly id: string; readonly signalUnit: 'counts' | 'signal' },
): string {
  const nm = figure.wavelengthNm;
  const halfPixelNm = nm.length > 1 ? ((nm.at(-1) ?? 0) - (nm[0] ?? 0)) / (nm.length - 1) / 2 : 0.5;
  const x = {
    low: (nm[0] ?? 0) - halfPixelNm,
    high: (nm.at(-1) ?? 1) + halfPixelNm,
    label: 'wavelength / nm',
    tickCount: 4,
  };
  const plotWidth = width - margins.left - margins.right;
  const fit = linearPlot(
    { left: margins.left, top: margins.top, width: plotWidth, height: fitHeight },
    { ...x, hasTickLabels: false },
    {
      ...paddedRange(ordinates(figure), { below: 0.06, above: 0.1 }),
      label: options.signalUnit,
      tickCount: 4,
    },
  );
  const strip = residualStrip(figure, x, plotWidth);
  const label = lineLabel(figure.lineId);
  const name = label.length > 22 ? `${label.slice(0, 21)}…` : label;
  const state = line === undefined ? '' : line.used ? 'used' : 'left out';
  return figureRoot(
    {
      id: options.id,
      width,
      height,
      title: `${label}: data, fit and residuals`,
      description: describe(figure, line),
    },
    [
      textElement(name, { x: margins.left, y: 12, fill: ink.text, 'font-size': 11.5, 'font-weight': 600 }),
      textElement(state, {
        x: width - margins.right,
        y: 12,
        fill: ink.muted,
        'text-anchor': 'end',
        'font-style': line?.used === false ? 'italic' : 'normal',
      }),
      fit.background,
      clippedTo(fit.area, ...fitMarks(fit, figure)),
      fit.frame,
      strip,
    ],
  );
}

/** Everything that has to be seen whole: points with their bars, curve, baseline. */
function* ordinates(figure: LineFigure): Generator<number> {
  for (const [index, signal] of figure.signal.entries()) {
    yield signal - (figure.sigma[index] ?? 0);
    yield signal + (figure.sigma[index] ?? 0);
  }
  yield* figure.curve;
  yield* figure.baseline;
}

function fitMarks(plot: Plot, figure: LineFigure): string[] {
  const { xAt, yAt } = plot;
  const curveOf = (nm: Float64Array, ordinate: Float64Array) =>
    polyline(Array.from(nm, (each, index) => [xAt(each), yAt(ordinate[index] ?? Number.NaN)] as const));
  const good: [number, number][] = [];
  const clipped: [number, number][] = [];
  const bars: { x: number; y1: number; y2: number }[] = [];
  for (const [index, nm] of figure.wavelengthNm.entries()) {
    const signal = figure.signal[index] ?? 0;
    const sigma = figure.sigma[index] ?? 0;
    const at: [number, number] = [xAt(nm), yAt(signal)];
    if (figure.clipped[index] === 1) clipped.push(at);
    else good.push(at);
    bars.push({ x: at[0], y1: yAt(signal - sigma), y2: yAt(signal + sigma) });
  }
  return [
    element('path', {
      d: curveOf(figure.wavelengthNm, figure.baseline),
      stroke: ink.baseline,
      'stroke-width': 1,
      'stroke-dasharray': dashes.baseline,
      fill: 'none',
    }),
    element('path', {
      d: curveOf(figure.curveNm, figure.curve),
      stroke: ink.model,
      'stroke-width': 1.3,
      'stroke-linejoin': 'round',
      fill: 'none',
    }),
    errorBars(bars, 1.2),
    discs(good, pointRadius(figure.wavelengthNm.length)),
    crosses(clipped, 2.4),
  ];
}

function residualStrip(
  figure: LineFigure,
  x: { readonly low: number; readonly high: number; readonly label: string; readonly tickCount: number },
  plotWidth: number,
): string {
  const largest = figure.residualSigma.reduce((most, each) => Math.max(most, Math.abs(each)), 0);
  const reach = Math.min(stripSigma.most, Math.max(stripSigma.least, largest * 1.1));
  const area = {
    left: margins.left,
    top: margins.top + fitHeight + stripGap,
    width: plotWidth,
    height: stripHeight,
  };
  const plot = linearPlot(area, x, { low: -reach, high: reach, label: 'res. / σ', tickCount: 4 });
  const points: [number, number][] = [];
  const clipped: [number, number][] = [];
  for (const [index, nm] of figure.wavelengthNm.entries()) {
    const residual = Math.max(-reach, Math.min(reach, figure.residualSigma[index] ?? 0));
    (figure.clipped[index] === 1 ? clipped : points).push([plot.xAt(nm), plot.yAt(residual)]);
  }
  return [
    element('rect', { x: area.left, y: area.top, width: area.width, height: area.height, fill: ink.strip }),
    ...[-2, 0, 2].map((level) => levelLine(plot, level)),
    clippedTo(area, discs(points, pointRadius(points.length) * 0.8), crosses(clipped, 2)),
    plot.frame,
  ].join('');
}

function pointRadius(pointCount: number): number {
  return pointCount > 60 ? 1.1 : pointCount > 30 ? 1.5 : 1.9;
}

function describe(figure: LineFigure, line: DiagnosedLine | undefined): string {
  const [first, last] = [figure.wavelengthNm[0] ?? 0, figure.wavelengthNm.at(-1) ?? 0];
  const clippedCount = figure.clipped.reduce((sum, flag) => sum + flag, 0);
  const range = `${formatAtPlace(figure.wavelengthNm.length, 0)} pixels from ${formatAtPlace(first, -2)} to ${formatAtPlace(last, -2)} nm`;
  const fit =
    line === undefined
      ? ''
      : ` Reduced chi-square ${formatSignificant(line.reducedChiSquare, 3)}; ${line.used ? 'used' : 'left out'}.`;
  return `${range}, ${formatAtPlace(clippedCount, 0)} of them clipped.${fit}`;
}
