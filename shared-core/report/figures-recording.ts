import type { RecordingFigure } from '../diagnosis/figures.ts';
import { clippedTo, linearPlot, paddedRange, type Plot, type PlotArea } from './chart-axes.ts';
import { ink } from './chart-style.ts';
import { envelopeIndices } from './envelope.ts';
import { formatAtPlace } from '../text/format-number.ts';
import { lineLabel } from './line-label.ts';
import { crosses } from './markers.ts';
import { coordinate, element, figureRoot, polyline, textElement } from './svg.ts';

const width = 680;
const margins = { left: 58, right: 10 };
const nameStripHeight = 34;
const panelHeight = { whole: 150, enlarged: 110 };
/** The second panel appears when the weakest used line is lower than this part of the tallest. */
const weakPart = 0.15;

/** The recording: signal against wavelength with fitted windows and line names; weak lines again on a larger scale. */
export function recordingSvg(figure: RecordingFigure, options: { readonly id: string }): string {
  const { wavelengthNm, signal } = figure;
  const x = { low: wavelengthNm[0] ?? 0, high: wavelengthNm.at(-1) ?? 1 };
  const whole = paddedRange(signal, { below: 0.03, above: 0.05 });
  const enlargedTop = heightOfWeakLines(figure, whole.high);
  const plotWidth = width - margins.left - margins.right;
  const xAxis = { ...x, label: 'wavelength / nm', tickCount: 12 };
  const label = `signal / ${figure.signalUnit === 'counts' ? 'counts' : 'units of the file'}`;
  const upper = linearPlot(
    { left: margins.left, top: nameStripHeight, width: plotWidth, height: panelHeight.whole },
    { ...xAxis, hasTickLabels: enlargedTop === null },
    { ...whole, label, tickCount: 5 },
  );
  const body = [panel(upper, figure), lineNames(figure, upper)];
  let bottom = nameStripHeight + panelHeight.whole;
  if (enlargedTop !== null) {
    const area: PlotArea = {
      left: margins.left,
      top: bottom + 18,
      width: plotWidth,
      height: panelHeight.enlarged,
    };
    const span = { low: Math.max(whole.low, -0.06 * enlargedTop), high: enlargedTop };
    const lower = linearPlot(area, xAxis, { ...span, label: 'enlarged', tickCount: 4 });
    const caption = `the same, ordinate enlarged ${formatAtPlace(whole.high / enlargedTop, 0)} times`;
    body.push(
      panel(lower, figure),
      textElement(caption, {
        x: area.left + area.width,
        y: area.top - 5,
        'text-anchor': 'end',
        fill: ink.muted,
        'font-style': 'italic',
      }),
    );
    bottom = area.top + area.height;
  }
  const names = figure.marks.map((mark) => lineLabel(mark.lineId)).join(', ');
  const clippedCount = figure.clipped.reduce((sum, flag) => sum + flag, 0);
  return figureRoot(
    {
      id: options.id,
      width,
      height: bottom + 32,
      title: 'The recording',
      description:
        `Signal against wavelength from ${formatAtPlace(x.low, 0)} to ${formatAtPlace(x.high, 0)} nm. ` +
        `Lines marked: ${names || 'none'}. Clipped pixels: ${formatAtPlace(clippedCount, 0)}.`,
    },
    body,
  );
}

function panel(plot: Plot, figure: RecordingFigure): string {
  const { area, xAt, yAt } = plot;
  const windows = figure.windows.map(({ fromNm, toNm }) =>
    element('rect', {
      x: xAt(fromNm),
      y: area.top,
      width: Math.max(0.5, xAt(toNm) - xAt(fromNm)),
      height: area.height,
      fill: ink.window,
      'fill-opacity': 0.22,
    }),
  );
  const positions = figure.wavelengthNm.map(xAt);
  const curve = envelopeIndices(positions, figure.signal, 0.5).map(
    (index) => [positions[index] ?? Number.NaN, yAt(figure.signal[index] ?? Number.NaN)] as const,
  );
  const clipped: [number, number][] = [];
  for (const [index, flag] of figure.clipped.entries())
    if (flag === 1) clipped.push([positions[index] ?? 0, yAt(figure.signal[index] ?? 0)]);
  return [
    plot.background,
    clippedTo(
      area,
      ...windows,
      element('path', {
        d: polyline(curve),
        stroke: ink.data,
        'stroke-width': 0.8,
        'stroke-linejoin': 'round',
        fill: 'none',
      }),
      crosses(clipped, 2.5),
    ),
    plot.frame,
  ].join('');
}

/** Ticks along the top edge and names above them, pushed apart where lines crowd; names in brackets are not used. */
function lineNames(figure: RecordingFigure, plot: Plot): string {
  const { area, xAt } = plot;
  const marks = figure.marks
    .filter(
      ({ wavelengthNm }) => xAt(wavelengthNm) >= area.left && xAt(wavelengthNm) <= area.left + area.width,
    )
    .map((mark) => {
      const label = lineLabel(mark.lineId);
      const shown = label.length > 14 ? `${label.slice(0, 13)}…` : label;
      return { at: xAt(mark.wavelengthNm), text: mark.used ? shown : `(${shown})`, used: mark.used };
    })
    .sort((first, second) => first.at - second.at);
  const spread = spreadLabels(
    marks.map(({ at, text }) => ({ at, width: text.length * 6 + 5 })),
    { from: area.left, to: area.left + area.width },
  );
  return marks
    .map(({ at, text, used }, index) => {
      const x = spread[index] ?? at;
      const [from, to] = [coordinate(x), coordinate(at)];
      return (
        element('path', {
          d: `M${from} 17L${to} ${coordinate(area.top - 5)}V${coordinate(area.top)}`,
          stroke: ink.axis,
          'stroke-width': 0.8,
          fill: 'none',
        }) +
        textElement(text, {
          x,
          y: 13,
          'text-anchor': 'middle',
          fill: used ? ink.text : ink.muted,
          'font-weight': used ? 600 : 400,
        })
      );
    })
    .join('');
}

/**
 * Centres for labels in a row, in their order, without overlap and as near their anchors as that allows.
 *
 * Groups of touching labels are moved as one to the mean of their wishes; lengths in user units.
 *
 * @source own; the pooling of neighbours is that of isotonic regression
 * @check  test/unit/report/figures.test.ts
 */
export function spreadLabels(
  labels: readonly { readonly at: number; readonly width: number }[],
  room: { readonly from: number; readonly to: number },
): readonly number[] {
  interface Group {
    start: number;
    width: number;
    wish: number;
    members: { offset: number; width: number }[];
  }
  const groups: Group[] = [];
  for (const { at, width: labelWidth } of labels) {
    let group: Group = {
      start: at - labelWidth / 2,
      width: labelWidth,
      wish: at - labelWidth / 2,
      members: [{ offset: 0, width: labelWidth }],
    };
    for (let left = groups.at(-1); left && left.start + left.width > group.start; left = groups.at(-1)) {
      groups.pop();
      const count = left.members.length + group.members.length;
      const shifted = group.wish - left.width;
      const wish = (left.wish * left.members.length + shifted * group.members.length) / count;
      const leftWidth = left.width;
      group = {
        start: wish,
        width: left.width + group.width,
        wish,
        members: [
          ...left.members,
          ...group.members.map((member) => ({ ...member, offset: member.offset + leftWidth })),
        ],
      };
    }
    groups.push(group);
  }
  return groups.flatMap(({ start, width: groupWidth, members }) => {
    const kept = Math.max(room.from, Math.min(start, room.to - groupWidth));
    return members.map(({ offset, width: memberWidth }) => kept + offset + memberWidth / 2);
  });
}

/** Top of the enlarged panel: a little above the weakest used line; null when nothing is gained. */
function heightOfWeakLines(figure: RecordingFigure, wholeTop: number): number | null {
  let weakest = Number.POSITIVE_INFINITY;
  for (const { lineId, used } of figure.marks) {
    const window = figure.windows.find((each) => each.lineId === lineId);
    if (!used || window === undefined) continue;
    let peak = Number.NEGATIVE_INFINITY;
    for (const [index, nm] of figure.wavelengthNm.entries())
      if (nm >= window.fromNm && nm <= window.toNm) peak = Math.max(peak, figure.signal[index] ?? peak);
    weakest = Math.min(weakest, peak);
  }
  if (!Number.isFinite(weakest) || weakest <= 0 || weakest > weakPart * wholeTop) return null;
  // Twice the weakest, so that it is seen whole and its neighbours still hint at their size.
  return Math.max(2 * weakest, wholeTop / 200);
}
