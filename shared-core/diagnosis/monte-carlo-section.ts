import type { DrawnTemperature } from '../populations/check-by-drawing.ts';
import type { TemperatureFit } from '../populations/temperature.ts';
import type { Diagnosis } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';
import { plain } from './plain-number.ts';

/** What the trials say, in the diagnosis format; null unless they were asked for and there was something to draw. */
export function monteCarloSection({ drawn, temperature }: Evidence): Diagnosis['monteCarlo'] {
  if (drawn === null) return null;
  const { reason: _reason, ...numbers } = drawn;
  return { ...numbers, coverage: temperature.coverage, text: textOf(drawn, temperature) };
}

function textOf(drawn: DrawnTemperature, { lowKelvin, highKelvin }: TemperatureFit): string {
  const { trials, lowKelvin: low, highKelvin: high } = drawn;
  if (drawn.reason !== '')
    return `${String(trials)} Monte Carlo trials neither confirm nor replace the first-order interval: ${drawn.reason}.`;
  const interval =
    low === null || high === null
      ? 'no upper end of the interval'
      : `${plain(low, 4)} to ${plain(high, 4)} K`;
  const stable = drawn.isStable ? '' : '; not stable to two digits after that many';
  if (drawn.confirmsFirstOrder)
    return `${String(trials)} Monte Carlo trials confirm the first-order interval (${interval}${stable}).`;
  const firstOrder =
    lowKelvin === null || highKelvin === null
      ? ''
      : `, where the first order says ${plain(lowKelvin, 4)} to ${plain(highKelvin, 4)} K`;
  return `${String(trials)} Monte Carlo trials give ${interval}${firstOrder}${stable}.`;
}

/** The interval that stands: that of the trials where they were drawn and do not confirm the first order. */
export function standingInterval({ drawn, temperature }: Evidence): {
  readonly lowKelvin: number | null;
  readonly highKelvin: number | null;
} {
  const isReplaced =
    drawn !== null &&
    !drawn.confirmsFirstOrder &&
    temperature.status === 'measured' &&
    drawn.lowKelvin !== null &&
    drawn.highKelvin !== null;
  return isReplaced ? drawn : temperature;
}

/** What the trials did to the interval, to follow the text of the temperature. */
export function monteCarloRemark(evidence: Evidence): string {
  if (standingInterval(evidence) === evidence.drawn)
    return ' The interval is that of the Monte Carlo trials.';
  return evidence.drawn?.confirmsFirstOrder === true ? ' Confirmed by Monte Carlo.' : '';
}
