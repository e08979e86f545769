import type { RecordingFigure } from '../../../shared-core/diagnosis/figures.ts';
import { nearestIndex } from '../../charts/envelope.ts';
import { clampRange, panBy, type ViewRange, zoomAbout } from '../../charts/view-range.ts';

export interface ChartView {
  readonly figure: RecordingFigure;
  readonly whole: ViewRange;
  readonly range: ViewRange;
  readonly cursor: number | null;
}

export interface ChartMove {
  readonly range?: ViewRange;
  readonly cursor?: number;
  readonly isLogSwitched?: true;
}

interface Key {
  readonly key: string;
  readonly shiftKey: boolean;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly altKey: boolean;
}

const zoomStep = 0.6;
const panStep = 0.2;

/** What a key does on the recording, or null when it is not one of the chart's. KeysDialog lists them. */
export function chartKey(key: Key, view: ChartView): ChartMove | null {
  if (key.ctrlKey || key.metaKey || key.altKey) return null;
  const { range, whole } = view;
  switch (key.key) {
    case 'ArrowLeft':
      return key.shiftKey ? withCursor(view, stepped(view, -1)) : { range: panBy(range, -panStep, whole) };
    case 'ArrowRight':
      return key.shiftKey ? withCursor(view, stepped(view, 1)) : { range: panBy(range, panStep, whole) };
    case 'PageUp':
      return withCursor(view, nextMark(view, -1));
    case 'PageDown':
      return withCursor(view, nextMark(view, 1));
    case '+':
    case '=':
      return { range: zoomAbout(range, aboutNm(view), zoomStep, whole) };
    case '-':
      return { range: zoomAbout(range, aboutNm(view), 1 / zoomStep, whole) };
    case '0':
    case 'Home':
      return { range: whole };
    case 'l':
    case 'L':
      return { isLogSwitched: true };
    default:
      return null;
  }
}

const middle = (range: ViewRange): number => (range.fromNm + range.toNm) / 2;

/** The cursor where it is in view, else the middle. */
function aboutNm({ figure, range, cursor }: ChartView): number {
  const nm = cursor === null ? undefined : figure.wavelengthNm[cursor];
  return nm !== undefined && nm >= range.fromNm && nm <= range.toNm ? nm : middle(range);
}

function stepped({ figure, range, cursor }: ChartView, by: number): number {
  const from = cursor ?? nearestIndex(figure.wavelengthNm, middle(range)) - by;
  return Math.min(figure.wavelengthNm.length - 1, Math.max(0, from + by));
}

function nextMark({ figure, cursor }: ChartView, direction: 1 | -1): number | null {
  const marks = figure.marks
    .map((mark) => nearestIndex(figure.wavelengthNm, mark.wavelengthNm))
    .sort((a, b) => a - b);
  if (direction === 1) return marks.find((index) => index > (cursor ?? -1)) ?? null;
  return marks.findLast((index) => index < (cursor ?? Infinity)) ?? null;
}

/** Moves the cursor, and the view with it when it would leave. */
function withCursor({ figure, range, whole }: ChartView, cursor: number | null): ChartMove {
  if (cursor === null) return {};
  const nm = figure.wavelengthNm[cursor] ?? 0;
  if (nm >= range.fromNm && nm <= range.toNm) return { cursor };
  const half = (range.toNm - range.fromNm) / 2;
  return { cursor, range: clampRange({ fromNm: nm - half, toNm: nm + half }, whole) };
}
