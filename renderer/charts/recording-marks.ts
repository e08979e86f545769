import type { ChartType, Plugin } from 'chart.js';
import { chartFont, type Palette } from './palette.ts';

/** What is drawn around the curve of a recording: fitted windows, names of lines, clipped pixels. */
export interface RecordingMarks {
  readonly windows: readonly { readonly fromNm: number; readonly toNm: number }[];
  readonly ticks: readonly { readonly atNm: number; readonly name: string; readonly isUsed: boolean }[];
  readonly clippedNm: readonly number[];
  readonly palette: Palette;
}

declare module 'chart.js' {
  interface PluginOptionsByType<TType extends ChartType> {
    recordingMarks?: TType extends 'line' ? RecordingMarks : never;
  }
}

const tickLengthPx = 7;
const fontSizePx = 12;

export const recordingMarksPlugin: Plugin<'line', Partial<RecordingMarks>> = {
  id: 'recordingMarks',
  beforeDatasetsDraw({ ctx, chartArea, scales }, _args, options) {
    const scale = scales['x'];
    if (scale === undefined || options.windows === undefined || options.palette === undefined) return;
    ctx.save();
    ctx.fillStyle = options.palette.window;
    for (const { fromNm, toNm } of options.windows) {
      const left = Math.max(chartArea.left, scale.getPixelForValue(fromNm));
      const right = Math.min(chartArea.right, scale.getPixelForValue(toNm));
      if (right > left) ctx.fillRect(left, chartArea.top, right - left, chartArea.bottom - chartArea.top);
    }
    ctx.restore();
  },
  afterDatasetsDraw({ ctx, chartArea, scales }, _args, options) {
    const scale = scales['x'];
    if (scale === undefined || options.palette === undefined) return;
    const inside = (px: number): boolean => px >= chartArea.left && px <= chartArea.right;
    ctx.save();
    ctx.font = `600 ${String(fontSizePx)}px ${chartFont}`;
    ctx.textAlign = 'center';
    ctx.textBaseline = 'top';
    const placed = placeNames(
      (options.ticks ?? [])
        .map((tick) => ({ ...tick, px: scale.getPixelForValue(tick.atNm) }))
        .filter((tick) => inside(tick.px)),
      (name) => ctx.measureText(name).width,
    );
    for (const tick of placed) {
      ctx.strokeStyle = tick.isUsed ? options.palette.accent : options.palette.muted;
      ctx.fillStyle = tick.isUsed ? options.palette.ink : options.palette.muted;
      ctx.lineWidth = tick.isUsed ? 2 : 1;
      ctx.beginPath();
      ctx.moveTo(tick.px, chartArea.top);
      ctx.lineTo(tick.px, chartArea.top + tickLengthPx);
      ctx.stroke();
      if (tick.isNamed) ctx.fillText(tick.name, tick.px, chartArea.top + tickLengthPx + 1);
    }
    ctx.fillStyle = options.palette.alarm;
    for (const atNm of options.clippedNm ?? []) {
      const px = scale.getPixelForValue(atNm);
      // Triangles that point down from the top edge, below the names.
      if (inside(px)) drawTriangle(ctx, px, chartArea.top + tickLengthPx + fontSizePx + 4);
    }
    ctx.restore();
  },
};

function drawTriangle(ctx: CanvasRenderingContext2D, px: number, top: number): void {
  ctx.beginPath();
  ctx.moveTo(px - 3, top);
  ctx.lineTo(px + 3, top);
  ctx.lineTo(px, top + 6);
  ctx.fill();
}

/**
 * Which names fit side by side. Near the series limit lines crowd: used lines get their name first, then
 * the others from the red end on, where they are strongest.
 */
export function placeNames<T extends { px: number; name: string; isUsed: boolean }>(
  ticks: readonly T[],
  widthOf: (name: string) => number,
): readonly (T & { isNamed: boolean })[] {
  const taken: { left: number; right: number }[] = [];
  const named = new Set<T>();
  const ranked = [...ticks].sort((a, b) => Number(b.isUsed) - Number(a.isUsed) || b.px - a.px);
  for (const tick of ranked) {
    const half = widthOf(tick.name) / 2 + 3;
    const place = { left: tick.px - half, right: tick.px + half };
    if (taken.some((other) => place.left < other.right && place.right > other.left)) continue;
    taken.push(place);
    named.add(tick);
  }
  return ticks.map((tick) => ({ ...tick, isNamed: named.has(tick) }));
}
