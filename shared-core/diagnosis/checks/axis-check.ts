import { toRecordedNm } from '../../axis/axis-polynomial.ts';
import type { Check } from '../diagnosis.ts';
import { listNames, type Evidence } from '../evidence.ts';
import { plain } from '../plain-number.ts';

/** Shift of the recorded axis at H-beta, nm: recorded minus true. */
export function shiftNm({ registration }: Pick<Evidence, 'registration'>): number {
  const hBetaNm = 486.1;
  return toRecordedNm(registration.map, hBetaNm) - hBetaNm;
}

/** Whether the Balmer pattern was found, and how far the axis was off. */
export function axisCheck(evidence: Evidence): Check {
  const { registration, search } = evidence;
  const ids = registration.matched.map(({ id }) => id);
  const shift = shiftNm(evidence);
  const facts = {
    status: registration.status,
    shiftNm: registration.status === 'registered' ? shift : null,
    stretchPerMille: registration.status === 'registered' ? 1000 * registration.map.stretch : null,
    matchedLines: ids.join(' '),
    evidence: registration.evidence,
    rivalEvidence: registration.rivalEvidence,
  };
  if (registration.status === 'ambiguous') {
    return {
      id: 'axis-shift',
      verdict: 'not defensible',
      facts,
      text: 'Two readings of the wavelength axis fit the Balmer pattern about equally well, so no line can be named.',
      remedy:
        'Check the wavelength axis with a reference lamp, or record a range that holds H-alpha and H-beta.',
    };
  }
  if (registration.status === 'not-found') {
    return {
      id: 'axis-shift',
      verdict: 'not defensible',
      facts,
      text:
        ids.length === 0
          ? 'The Balmer pattern was not found within 9 nm of shift and 1.5 % of stretch.'
          : `Only ${listNames(ids)} could be made out, which is not enough to recognise the Balmer pattern.`,
      remedy: 'Record longer, or a range that holds H-alpha and H-beta; check that the lamp holds hydrogen.',
    };
  }
  const isShifted =
    Math.abs(shift) > Math.max(0.5 * search.fwhmNm, 0.1) || Math.abs(registration.map.stretch) > 0.002;
  const isUntested = isShifted && ids.length < 3;
  const found = isShifted
    ? `The recorded axis reads ${plain(Math.abs(shift), 3)} nm too ${shift > 0 ? 'high' : 'low'} at H-beta (stretch ${plain(1000 * registration.map.stretch, 2)} per mille); corrected with ${listNames(ids)}.`
    : `The axis agrees with ${listNames(ids)} to ${plain(Math.abs(shift), 2)} nm.`;
  return {
    id: 'axis-shift',
    verdict: isUntested ? 'use with care' : 'sound',
    facts,
    text: found,
    remedy: isShifted ? 'Calibrate the wavelength axis with a reference lamp.' : '',
  };
}
