import { ink } from './chart-style.ts';
import { coordinate, element } from './svg.ts';

/** Vertical bars with end caps, one path for all of them; each from y1 to y2 at x. */
export function errorBars(
  bars: readonly { readonly x: number; readonly y1: number; readonly y2: number }[],
  capWidth: number,
): string {
  const d = bars
    .map(({ x, y1, y2 }) => {
      const [left, right] = [coordinate(x - capWidth), coordinate(x + capWidth)];
      return `M${coordinate(x)} ${coordinate(y1)}V${coordinate(y2)}M${left} ${coordinate(y1)}H${right}M${left} ${coordinate(y2)}H${right}`;
    })
    .join('');
  return d === '' ? '' : element('path', { d, stroke: ink.data, 'stroke-width': 0.7, fill: 'none' });
}

/** Filled discs: data that count. */
export function discs(centres: readonly (readonly [number, number])[], radius: number): string {
  return centres.map(([cx, cy]) => element('circle', { cx, cy, r: radius, fill: ink.data })).join('');
}

/** Hollow circles: data that are shown but left out. */
export function rings(centres: readonly (readonly [number, number])[], radius: number): string {
  return centres
    .map(([cx, cy]) =>
      element('circle', { cx, cy, r: radius, fill: '#FFFFFF', stroke: ink.data, 'stroke-width': 1 }),
    )
    .join('');
}

/** Diagonal crosses in the colour of clipped pixels. */
export function crosses(centres: readonly (readonly [number, number])[], arm: number): string {
  const d = centres
    .map(([x, y]) => {
      const [left, right, top, bottom] = [x - arm, x + arm, y - arm, y + arm].map(coordinate);
      return `M${left ?? ''} ${top ?? ''}L${right ?? ''} ${bottom ?? ''}M${left ?? ''} ${bottom ?? ''}L${right ?? ''} ${top ?? ''}`;
    })
    .join('');
  return d === '' ? '' : element('path', { d, stroke: ink.clipped, 'stroke-width': 1.3, fill: 'none' });
}

/** A bar with an arrow downwards: the point lies below. */
export function upperLimitArrow(x: number, y: number): string {
  return element('path', {
    d: `M${coordinate(x - 4)} ${coordinate(y)}h8m-4 0v15m-3 -5l3 5l3 -5`,
    stroke: ink.data,
    'stroke-width': 1,
    fill: 'none',
  });
}
