import { chiSquareUpperTail } from '../../numeric/distributions.ts';
import { hBetaTabulatedFwhmNm } from '../../physics/stark-table.ts';
import { influence } from '../../populations/influence.ts';
import { curvature } from '../../populations/curvature.ts';
import type { Check } from '../diagnosis.ts';
import { usedFits, type Evidence } from '../evidence.ts';
import { plain } from '../plain-number.ts';

/** A curvature this many sigma from zero is a bend. */
export const leastBend = 2.6;

/** Whether the populations lie on a straight line: chi-square and curvature. */
export function straightnessCheck({ temperature, response }: Evidence): Check {
  const id = 'population-straightness';
  const { boltzmann } = temperature;
  if (boltzmann === null) {
    return {
      id,
      verdict: 'not defensible',
      facts: {},
      text: 'There is no population plot to judge.',
      remedy: '',
    };
  }
  const { chiSquare, degreesOfFreedom } = boltzmann.line;
  if (degreesOfFreedom < 1) {
    return {
      id,
      verdict: 'use with care',
      facts: { chiSquare: null, degreesOfFreedom: 0, pValue: null, curvatureZ: null },
      text: 'Two lines always lie on a straight line, so nothing tests whether a temperature exists.',
      remedy: 'Bring a third Balmer line out of the noise.',
    };
  }
  const pValue = chiSquareUpperTail(chiSquare, degreesOfFreedom);
  const bend = curvature(boltzmann);
  const facts = {
    chiSquare,
    degreesOfFreedom,
    pValue,
    curvatureZ: bend?.z ?? null,
    curvaturePerEv2: bend?.value ?? null,
  };
  const size = Math.abs(bend?.z ?? 0);
  const numbers = `chi-square ${plain(chiSquare, 3)} for ${String(degreesOfFreedom)} degrees of freedom, p = ${plain(pValue, 2)}`;
  if (pValue >= 0.05 && size < leastBend) {
    return {
      id,
      verdict: 'sound',
      facts,
      text: `The populations lie on a straight line (${numbers}).`,
      remedy: '',
    };
  }
  const direction =
    bend === null || size < 2
      ? ''
      : bend.value < 0
        ? ' and bend down at both ends, as when H-alpha is self-absorbed'
        : ' and bend up at both ends, as with two groups of electrons or a recombining gas';
  return {
    id,
    verdict: pValue < 1e-3 ? 'not defensible' : 'use with care',
    facts,
    text: `The populations leave the straight line${direction} (${numbers}).`,
    remedy:
      response === null
        ? 'Give a response table first: without one the bend may be the spectrometer.'
        : 'Leave out H-alpha and compare; check the response table and the blends.',
  };
}

/** Energy span of the used levels. */
export function spanCheck(evidence: Evidence): Check {
  const { temperature, fittedLines } = evidence;
  const energies = temperature.used.map((index) => fittedLines[index]!.upperEnergyEv);
  const spanEv = energies.length < 2 ? 0 : Math.max(...energies) - Math.min(...energies);
  const verdict = spanEv >= 0.9 ? 'sound' : spanEv >= 0.25 ? 'use with care' : 'not defensible';
  return {
    id: 'energy-span',
    verdict,
    facts: { spanEv, lineCount: energies.length },
    text:
      spanEv === 0
        ? 'There are not two levels to compare.'
        : `The upper levels in use span ${plain(spanEv, 3)} eV.`,
    remedy:
      verdict === 'sound'
        ? ''
        : 'Bring H-alpha and a line beyond H-beta in, unclipped, to widen the span to 0.9 eV.',
  };
}

/** Whether one line pulls the result. */
export function influenceCheck(evidence: Evidence): Check {
  const id = 'single-line-influence';
  const { boltzmann } = evidence.temperature;
  const used = usedFits(evidence);
  if (boltzmann === null || used.length < 3) {
    return {
      id,
      verdict: boltzmann === null ? 'not defensible' : 'use with care',
      facts: { lineId: null, shiftSigma: null },
      text: 'With fewer than three lines the result rests on each of them alone.',
      remedy: 'Bring a third Balmer line out of the noise.',
    };
  }
  const pulls = influence(boltzmann);
  const worst = pulls.reduce((most, pull) =>
    Math.abs(pull.shiftSigma) > Math.abs(most.shiftSigma) ? pull : most,
  );
  const lineId = used[worst.index]!.id;
  const facts = {
    lineId,
    shiftSigma: worst.shiftSigma,
    kelvinWithout: worst.kelvinWithout,
  };
  const isPulled = Math.abs(worst.shiftSigma) > 2.6;
  const without = worst.kelvinWithout === null ? 'no temperature' : `${plain(worst.kelvinWithout, 4)} K`;
  return {
    id,
    verdict: isPulled ? 'use with care' : 'sound',
    facts,
    text: isPulled
      ? `${lineId} pulls the result: without it the answer is ${without}, ${plain(Math.abs(worst.shiftSigma), 2)} sigma away.`
      : `No single line pulls the result; the most influential, ${lineId}, moves it by ${plain(Math.abs(worst.shiftSigma), 2)} sigma.`,
    remedy: isPulled ? `Look at the chart of ${lineId} and decide whether it belongs in.` : '',
  };
}

/** Whether the electron density could be had. */
export function densityCheck({ density, fits, temperature }: Evidence): Check {
  const { starkFwhmNm, perCubicMetre } = density;
  const tabulated =
    density.line !== 'H-beta' || perCubicMetre === null || temperature.kelvin === null
      ? null
      : hBetaTabulatedFwhmNm(perCubicMetre, temperature.kelvin);
  const facts = {
    status: density.status,
    starkFwhmNm,
    starkFwhmSigmaNm: density.starkFwhmSigmaNm,
    instrumentFwhmNm: fits.instrumentFwhmNm,
    tabulatedFwhmNm: tabulated,
  };
  const second =
    tabulated === null ? '' : `; at that density the tabulated theory gives ${plain(tabulated, 3)} nm`;
  const text =
    density.status === 'measured'
      ? `${density.line ?? ''} shows a Stark width of ${plain(density.starkFwhmNm ?? NaN, 3)} nm beyond the instrument${second}.`
      : density.status === 'upper-limit'
        ? `Only an upper limit of the electron density: ${density.reason}.`
        : `The electron density is not determined: ${density.reason}.`;
  return {
    id: 'density-detectable',
    verdict: density.status === 'not-determined' ? 'use with care' : 'sound',
    facts,
    text,
    remedy:
      density.status === 'measured'
        ? ''
        : fits.instrumentFrom === 'recording'
          ? 'Give the instrument width in the bench file, measured on a narrow reference line.'
          : 'Use a narrower instrument width to see smaller densities.',
  };
}
