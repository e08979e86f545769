import type { ChartConfiguration } from 'chart.js';
import { type RefObject, useEffect, useRef } from 'react';
import { Chart } from './register.ts';

export interface ChartCanvasProps {
  readonly config: ChartConfiguration<'line'>;
  /** What the chart shows, for those who do not see it; the numbers stand in a table or in text beside it. */
  readonly label: string;
  readonly chartRef?: RefObject<Chart<'line'> | null>;
}

/** A chart.js chart that follows its config. The config is made afresh each time, so chart.js may keep it. */
export function ChartCanvas({ config, label, chartRef }: ChartCanvasProps) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const own = useRef<Chart<'line'> | null>(null);

  useEffect(() => {
    if (canvas.current === null) return;
    const existing = own.current;
    if (existing === null) {
      own.current = new Chart<'line'>(canvas.current, config);
    } else {
      existing.data = config.data;
      existing.options = config.options ?? {};
      existing.update('none');
    }
    if (chartRef !== undefined) chartRef.current = own.current;
  }, [config, chartRef]);

  useEffect(() => {
    // Letters are measured when drawn: once more when the font has come.
    void document.fonts.ready.then(() => own.current?.update('none'));
    return () => {
      own.current?.destroy();
      own.current = null;
    };
  }, []);

  return <canvas ref={canvas} role="img" aria-label={label} />;
}
