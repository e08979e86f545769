import type { Verdict } from '../diagnosis/diagnosis.ts';
import { element } from './svg.ts';

/** Worst first. */
export const verdictRank: Readonly<Record<Verdict, number>> = {
  'not defensible': 0,
  'use with care': 1,
  sound: 2,
};

/** Disc, triangle, square for running text. */
export const verdictGlyph: Readonly<Record<Verdict, string>> = {
  sound: '●',
  'use with care': '▲',
  'not defensible': '■',
};

/** The same shapes drawn, so that no font can be missing them. The word always stands beside it. */
export function verdictShapeSvg(verdict: Verdict, size: number): string {
  const shapes: Readonly<Record<Verdict, string>> = {
    sound: element('circle', { cx: 10, cy: 10, r: 8, fill: '#0B6E69' }),
    'use with care': element('path', { d: 'M10 1.5L19 18H1Z', fill: '#B35900' }),
    'not defensible': element('rect', { x: 2, y: 2, width: 16, height: 16, fill: '#8C1D18' }),
  };
  return element(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      viewBox: '0 0 20 20',
      width: size,
      height: size,
      'aria-hidden': 'true',
    },
    shapes[verdict],
  );
}
