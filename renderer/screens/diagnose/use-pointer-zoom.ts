import { type RefObject, useEffect, useRef } from 'react';
import type { RecordingFigure } from '../../../shared-core/diagnosis/figures.ts';
import { nearestIndex } from '../../charts/envelope.ts';
import type { Chart } from '../../charts/register.ts';
import { clampRange, panBy, type ViewRange, zoomAbout } from '../../charts/view-range.ts';

export interface PointerZoom {
  readonly figure: RecordingFigure;
  readonly whole: ViewRange;
  readonly range: ViewRange;
  readonly onRange: (range: ViewRange) => void;
  readonly onCursor: (index: number | null) => void;
  readonly frame: RefObject<HTMLDivElement | null>;
  readonly chart: RefObject<Chart<'line'> | null>;
}

/** Shorter than this a drag is a click. */
const minDragPx = 5;

/** Drag zooms, a double click shows the whole, the wheel zooms while the chart has the focus or Ctrl is held. */
export function usePointerZoom(props: PointerZoom): RefObject<HTMLDivElement | null> {
  const selection = useRef<HTMLDivElement>(null);
  const latest = useRef(props);
  useEffect(() => {
    latest.current = props;
  });

  const { frame } = props;
  useEffect(() => {
    const box = frame.current;
    if (box === null) return undefined;
    let dragFromPx: number | null = null;
    const place = (event: MouseEvent): number => event.clientX - box.getBoundingClientRect().left;
    const nmAt = (px: number): number | undefined =>
      latest.current.chart.current?.scales['x']?.getValueForPixel(px);

    const show = (fromPx: number, toPx: number): void => {
      const area = latest.current.chart.current?.chartArea;
      if (selection.current === null || area === undefined) return;
      const left = Math.max(area.left, Math.min(fromPx, toPx));
      const right = Math.min(area.right, Math.max(fromPx, toPx));
      selection.current.hidden = Math.abs(toPx - fromPx) < minDragPx;
      selection.current.style.left = `${String(left)}px`;
      selection.current.style.width = `${String(Math.max(0, right - left))}px`;
      selection.current.style.top = `${String(area.top)}px`;
      selection.current.style.height = `${String(area.bottom - area.top)}px`;
    };
    const down = (event: PointerEvent): void => {
      if (event.button !== 0) return;
      dragFromPx = place(event);
      box.setPointerCapture(event.pointerId);
    };
    const move = (event: PointerEvent): void => {
      const { chart, figure, onCursor } = latest.current;
      onCursor(indexAt(chart.current, figure, place(event)));
      if (dragFromPx !== null) show(dragFromPx, place(event));
    };
    const up = (event: PointerEvent): void => {
      const from = dragFromPx;
      dragFromPx = null;
      if (selection.current !== null) selection.current.hidden = true;
      if (from === null || Math.abs(place(event) - from) < minDragPx) return;
      const [a, b] = [nmAt(from), nmAt(place(event))];
      if (a === undefined || b === undefined) return;
      const { whole, onRange } = latest.current;
      const inside = (nm: number): number => Math.min(whole.toNm, Math.max(whole.fromNm, nm));
      onRange(clampRange({ fromNm: inside(Math.min(a, b)), toNm: inside(Math.max(a, b)) }, whole));
    };
    const cancel = (): void => {
      dragFromPx = null;
      if (selection.current !== null) selection.current.hidden = true;
    };
    const leave = (): void => latest.current.onCursor(null);
    const reset = (): void => latest.current.onRange(latest.current.whole);
    const wheel = (event: WheelEvent): void => {
      // A wheel that only passes over the chart goes on scrolling the sheet.
      if (!event.ctrlKey && document.activeElement !== box) return;
      event.preventDefault();
      const { range, whole, onRange } = latest.current;
      if (Math.abs(event.deltaX) > Math.abs(event.deltaY)) {
        onRange(panBy(range, Math.sign(event.deltaX) * 0.05, whole));
        return;
      }
      const about = nmAt(place(event));
      if (about !== undefined) onRange(zoomAbout(range, about, event.deltaY < 0 ? 0.8 : 1.25, whole));
    };
    box.addEventListener('pointerdown', down);
    box.addEventListener('pointermove', move);
    box.addEventListener('pointerup', up);
    box.addEventListener('pointercancel', cancel);
    box.addEventListener('pointerleave', leave);
    box.addEventListener('dblclick', reset);
    box.addEventListener('wheel', wheel, { passive: false });
    return () => {
      box.removeEventListener('pointerdown', down);
      box.removeEventListener('pointermove', move);
      box.removeEventListener('pointerup', up);
      box.removeEventListener('pointercancel', cancel);
      box.removeEventListener('pointerleave', leave);
      box.removeEventListener('dblclick', reset);
      box.removeEventListener('wheel', wheel);
    };
  }, [frame]);
  return selection;
}

/** Index of the pixel under a horizontal position on the chart, or null outside its area. */
function indexAt(chart: Chart<'line'> | null, figure: RecordingFigure, px: number): number | null {
  const scale = chart?.scales['x'];
  const nm = scale?.getValueForPixel(px);
  if (chart === null || nm === undefined || px < chart.chartArea.left || px > chart.chartArea.right)
    return null;
  return nearestIndex(figure.wavelengthNm, nm);
}
