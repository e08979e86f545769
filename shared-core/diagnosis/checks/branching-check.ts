import { normalQuantile } from '../../numeric/distributions.ts';
import { branchingPairs } from '../../populations/branching.ts';
import { coversNm } from '../../populations/response-at.ts';
import type { Check } from '../diagnosis.ts';
import { populationInput, type Evidence } from '../evidence.ts';
import { plain } from '../plain-number.ts';

/** Whether lines that share an upper level agree, as they must where the response is right; null without such a pair. */
export function branchingCheck(evidence: Evidence): Check | null {
  const { fits, response, leftOut } = evidence;
  const eligible = [...fits.fits.keys()].filter((index) => {
    const fit = fits.fits[index]!;
    return (
      fit.status === 'converged' &&
      fit.area > 5 * fit.areaSigma &&
      !leftOut.includes(fit.id) &&
      (response === null || coversNm(response, fit.referenceNm))
    );
  });
  const pairs = branchingPairs(populationInput(evidence), eligible);
  if (pairs.length === 0) return null;
  const worst = pairs.reduce((so, pair) => (Math.abs(pair.z) > Math.abs(so.z) ? pair : so));
  // Two-sided chance of 1 % that the worst of all pairs lies so far out.
  const bound = normalQuantile(1 - 0.005 / pairs.length);
  const isSound = Math.abs(worst.z) < bound;
  const numbers = `${worst.lineIds[0]} over ${worst.lineIds[1]}, from n = ${String(worst.upperLevel)}, is ${plain(worst.ratio, 3)} of what the transition probabilities give (${plain(Math.abs(worst.z), 2)} sigma)`;
  return {
    id: 'response-branching',
    verdict: isSound ? 'sound' : 'use with care',
    facts: {
      pairCount: pairs.length,
      lineIds: worst.lineIds.join(' '),
      upperLevel: worst.upperLevel,
      ratio: worst.ratio,
      ratioSigma: worst.sigma,
      z: worst.z,
    },
    text: isSound
      ? `Lines from one upper level agree: ${numbers}.`
      : `Lines from one upper level disagree: ${numbers}.`,
    remedy: isSound
      ? ''
      : response === null
        ? 'Give a response table: this ratio does not depend on the gas.'
        : 'Check the response table between the two wavelengths: this ratio does not depend on the gas.',
  };
}
