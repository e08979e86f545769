import type { ChartType, Plugin } from 'chart.js';

/** A point with its standard uncertainty, drawn as a bar; an upper limit is an arrow that points down. */
export interface BarPoint {
  readonly x: number;
  readonly y: number;
  readonly sigma: number;
}

export interface ErrorBars {
  readonly bars: readonly (BarPoint & { readonly color: string })[];
  readonly arrows: readonly { readonly x: number; readonly y: number; readonly color: string }[];
  /** Names beside the points. */
  readonly names: readonly {
    readonly x: number;
    readonly y: number;
    readonly text: string;
    readonly color: string;
  }[];
  readonly font: string;
  readonly capPx: number;
}

declare module 'chart.js' {
  interface PluginOptionsByType<TType extends ChartType> {
    errorBars?: TType extends 'line' ? ErrorBars : never;
  }
}

const arrowLengthPx = 18;

export const errorBarsPlugin: Plugin<'line', Partial<ErrorBars>> = {
  id: 'errorBars',
  beforeDatasetsDraw({ ctx, chartArea, scales }, _args, options) {
    const { x: xScale, y: yScale } = scales;
    if (xScale === undefined || yScale === undefined) return;
    const clampY = (px: number): number => Math.min(yScale.bottom, Math.max(yScale.top, px));
    ctx.save();
    ctx.lineWidth = 1;
    const cap = options.capPx ?? 0;
    for (const bar of options.bars ?? []) {
      const px = xScale.getPixelForValue(bar.x);
      if (px < chartArea.left || px > chartArea.right) continue;
      const top = clampY(yScale.getPixelForValue(bar.y + bar.sigma));
      const bottom = clampY(yScale.getPixelForValue(bar.y - bar.sigma));
      ctx.strokeStyle = bar.color;
      ctx.beginPath();
      ctx.moveTo(px, top);
      ctx.lineTo(px, bottom);
      if (cap > 0) {
        ctx.moveTo(px - cap, top);
        ctx.lineTo(px + cap, top);
        ctx.moveTo(px - cap, bottom);
        ctx.lineTo(px + cap, bottom);
      }
      ctx.stroke();
    }
    for (const arrow of options.arrows ?? []) {
      const px = xScale.getPixelForValue(arrow.x);
      const top = yScale.getPixelForValue(arrow.y);
      const end = top + arrowLengthPx;
      ctx.strokeStyle = arrow.color;
      ctx.lineWidth = 1.5;
      ctx.beginPath();
      ctx.moveTo(px - 5, top);
      ctx.lineTo(px + 5, top);
      ctx.moveTo(px, top);
      ctx.lineTo(px, end);
      ctx.moveTo(px - 4, end - 5);
      ctx.lineTo(px, end);
      ctx.lineTo(px + 4, end - 5);
      ctx.stroke();
    }
    ctx.restore();
  },
  afterDatasetsDraw({ ctx, chartArea, scales }, _args, options) {
    const { x: xScale, y: yScale } = scales;
    if (xScale === undefined || yScale === undefined) return;
    ctx.save();
    ctx.font = options.font ?? ctx.font;
    ctx.textBaseline = 'bottom';
    for (const name of options.names ?? []) {
      const px = xScale.getPixelForValue(name.x);
      const width = ctx.measureText(name.text).width;
      // To the right of its point, or to the left of it where the edge is near.
      const isNearEdge = px + 8 + width > chartArea.right;
      ctx.textAlign = isNearEdge ? 'right' : 'left';
      ctx.fillStyle = name.color;
      ctx.fillText(name.text, px + (isNearEdge ? -8 : 8), yScale.getPixelForValue(name.y) - 4);
    }
    ctx.restore();
  },
};
