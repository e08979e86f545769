import { type KeyboardEvent, useEffect, useMemo, useRef } from 'react';
import type { RecordingFigure } from '../../../shared-core/diagnosis/figures.ts';
import { ChartCanvas } from '../../charts/chart-canvas.tsx';
import { recordingConfig } from '../../charts/recording-config.ts';
import type { Chart } from '../../charts/register.ts';
import type { ViewRange } from '../../charts/view-range.ts';
import { usePalette } from '../../ui/theme.ts';
import { useWidth } from '../../ui/use-width.ts';
import { cursorText } from './cursor-text.ts';
import { chartKey } from './chart-keys.ts';
import { usePointerZoom } from './use-pointer-zoom.ts';

export interface RecordingChartProps {
  readonly figure: RecordingFigure;
  readonly whole: ViewRange;
  readonly range: ViewRange;
  readonly onRange: (range: ViewRange) => void;
  readonly isLog: boolean;
  readonly onLog: () => void;
  /** Index of the pixel under the cursor. */
  readonly cursor: number | null;
  readonly onCursor: (index: number | null) => void;
}

/** The recording with a cursor that mouse and keys move, and the zoom. */
export function RecordingChart(props: RecordingChartProps) {
  const { figure, whole, range, isLog, cursor } = props;
  const palette = usePalette();
  const frame = useRef<HTMLDivElement>(null);
  const chart = useRef<Chart<'line'> | null>(null);
  const widthPx = useWidth(frame);
  const config = useMemo(
    () => recordingConfig({ figure, range, isLog, palette, widthPx }),
    [figure, range, isLog, palette, widthPx],
  );
  const selection = usePointerZoom({ ...props, frame, chart });

  const onKeyDown = (event: KeyboardEvent): void => {
    const next = chartKey(event, { figure, whole, range, cursor });
    if (next === null) return;
    event.preventDefault();
    if (next.range !== undefined) props.onRange(next.range);
    if (next.cursor !== undefined) props.onCursor(next.cursor);
    if (next.isLogSwitched === true) props.onLog();
  };

  const cursorNm = cursor === null ? undefined : figure.wavelengthNm[cursor];
  return (
    <div
      ref={frame}
      className="recording-chart"
      role="slider"
      tabIndex={0}
      aria-label="Cursor on the recording"
      aria-valuemin={whole.fromNm}
      aria-valuemax={whole.toNm}
      aria-valuenow={cursorNm ?? range.fromNm}
      aria-valuetext={
        cursor === null ? 'no cursor; Shift and an arrow key set it' : cursorText(figure, cursor)
      }
      onKeyDown={onKeyDown}
    >
      <ChartCanvas config={config} chartRef={chart} label={chartLabel(figure)} />
      <Overlay chart={chart} cursorNm={cursorNm} range={range} widthPx={widthPx} />
      <div ref={selection} className="zoom-selection" hidden />
    </div>
  );
}

function chartLabel(figure: RecordingFigure): string {
  const first = figure.wavelengthNm[0] ?? 0;
  const last = figure.wavelengthNm.at(-1) ?? 0;
  const names = figure.marks.map((mark) => mark.lineId).join(', ');
  return `Signal against wavelength from ${first.toFixed(1)} to ${last.toFixed(1)} nm. Lines found: ${names || 'none'}.`;
}

/** The cursor line lies over the chart, so that moving it does not draw the chart again. */
function Overlay(props: {
  readonly chart: React.RefObject<Chart<'line'> | null>;
  readonly cursorNm: number | undefined;
  readonly range: ViewRange;
  readonly widthPx: number;
}) {
  const line = useRef<HTMLDivElement>(null);
  const { chart, cursorNm, range, widthPx } = props;
  useEffect(() => {
    const scale = chart.current?.scales['x'];
    const area = chart.current?.chartArea;
    if (line.current === null) return;
    const px = cursorNm === undefined ? undefined : scale?.getPixelForValue(cursorNm);
    const isInside = px !== undefined && area !== undefined && px >= area.left && px <= area.right;
    line.current.hidden = !isInside;
    if (!isInside) return;
    line.current.style.left = `${String(px)}px`;
    line.current.style.top = `${String(area.top)}px`;
    line.current.style.height = `${String(area.bottom - area.top)}px`;
  }, [chart, cursorNm, range, widthPx]);
  return <div ref={line} className="cursor-line" hidden />;
}
