import { assumedResponseSigma } from '../../populations/response-at.ts';
import type { Check } from '../diagnosis.ts';
import { usedFits, type Evidence } from '../evidence.ts';
import { plain } from '../plain-number.ts';

/** Whether the spectral response is known; without it the temperature is a comparison value. */
export function responseCheck(evidence: Evidence): Check {
  const { response, bench } = evidence;
  const isIrradiance = bench.detector?.signal === 'energy';
  if (response === null && isIrradiance) {
    return {
      id: 'response',
      verdict: 'use with care',
      facts: { known: true, relativeSigma: null },
      text: 'The recording is an irradiance; the uncertainty of its calibration is not known and not in the interval.',
      remedy: 'Give a response table with uncertainties, flat if the recording is already corrected.',
    };
  }
  if (response === null) {
    return {
      id: 'response',
      verdict: 'use with care',
      facts: { known: false, relativeSigma: null },
      text: 'No response table was given: the temperature is uncorrected and serves for comparison on this bench only.',
      remedy: 'Record a standard lamp and give its response table.',
    };
  }
  const nm = usedFits(evidence).map(({ referenceNm }) => referenceNm);
  const facts = {
    known: true,
    table: response.name,
    relativeSigma: response.relativeSigma === null ? null : Math.max(...response.relativeSigma),
    correlationLengthNm: bench.response?.correlationLengthNm ?? null,
    lineCount: nm.length,
  };
  if (response.relativeSigma === null) {
    return {
      id: 'response',
      verdict: 'use with care',
      facts,
      text: `The response table states no uncertainty; ${plain(100 * assumedResponseSigma, 2)} % was assumed.`,
      remedy: 'Add the relative standard uncertainty of each point as a third column.',
    };
  }
  return {
    id: 'response',
    verdict: 'sound',
    facts,
    text: `The response was divided out with its uncertainty (up to ${plain(100 * Math.max(...response.relativeSigma), 2)} %).`,
    remedy: '',
  };
}
