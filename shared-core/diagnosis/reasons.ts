import { coversNm } from '../populations/response-at.ts';
import type { LineObstacle } from '../lines/line-fit.ts';
import type { Evidence } from './evidence.ts';
import { plain } from './plain-number.ts';

/** A line whose uncertainty had to be widened this much does not have the shape of the others. */
export const oddShape = 1.5;

/** Why a line is not used, in words; empty is never returned. */
export function reasonsOff(evidence: Evidence, lineId: string): string[] {
  const { fits, registration, leftOut, response } = evidence;
  const reasons: string[] = [];
  if (leftOut.includes(lineId)) reasons.push('switched off by hand');
  if (evidence.belowEquilibrium.includes(lineId)) {
    reasons.push('below the lowest level in equilibrium with the electrons');
  }
  if (registration.status !== 'registered') reasons.push('the wavelength axis is not registered');
  const obstacle = fits.obstacles.get(lineId);
  if (obstacle !== undefined) reasons.push(obstacleText(obstacle, evidence));
  const fit = fits.fits.find(({ id }) => id === lineId);
  if (fit !== undefined && fit.status !== 'converged') reasons.push(`the fit ended as "${fit.status}"`);
  if (fit !== undefined && response !== null && !coversNm(response, fit.referenceNm)) {
    reasons.push('the response table does not reach it');
  }
  if (reasons.length === 0 && fit !== undefined) {
    reasons.push(
      evidence.temperature.boltzmann === null
        ? 'there is no temperature fit to use it in'
        : fit.widening > oddShape
          ? 'its shape is not that of the other lines, and little is left of it within the widened uncertainty'
          : 'too faint: expected below three times its noise',
    );
  }
  return reasons.length === 0 ? ['not fitted'] : reasons;
}

function obstacleText(obstacle: LineObstacle, { recording }: Evidence): string {
  switch (obstacle.kind) {
    case 'out-of-range':
      return 'outside the recorded range';
    case 'clipped':
      return `clipped: ${String(obstacle.clippedPixelCount)} pixels at ${plain(recording.clipLevel ?? NaN, 6)} or above`;
    case 'core-deficit':
      return `its top lies ${plain(100 * obstacle.deficitFraction, 2)} % below what its flanks demand (soft clipping or self-absorption)`;
    case 'absorption':
      return `in absorption: its light lies below the continuum (${plain(obstacle.significance, 2)} sigma)`;
    case 'self-reversal':
      return `self-reversed: its middle lies ${plain(100 * obstacle.dipFraction, 2)} % below its shoulders, where cooler gas in front of it absorbs`;
    case 'no-pixels':
      return 'no pixel left to fit';
  }
}
