import {
  Chart,
  Filler,
  LinearScale,
  LineController,
  LineElement,
  LogarithmicScale,
  PointElement,
} from 'chart.js';
import { errorBarsPlugin } from './error-bars.ts';
import { recordingMarksPlugin } from './recording-marks.ts';

/** Only what is used. */
Chart.register(LineController, LineElement, PointElement, LinearScale, LogarithmicScale, Filler);
Chart.register(errorBarsPlugin, recordingMarksPlugin);

export { Chart };
