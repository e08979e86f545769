import { companionWords, plainCompanions } from '../companions.ts';
import { neighbourSpecies } from '../../lines/companion.ts';
import { standsOut } from '../../populations/temperature.ts';
import type { Check } from '../diagnosis.ts';
import { listNames, usedFits, type Evidence } from '../evidence.ts';
import { plain } from '../plain-number.ts';
import { oddShape } from '../reasons.ts';

/** How many lines stand out of the noise. */
export function significanceCheck(evidence: Evidence): Check {
  const used = usedFits(evidence);
  const strong = used.filter(standsOut);
  const weak = used.filter((fit) => !standsOut(fit));
  const facts = {
    strongLineCount: strong.length,
    weakLines: weak.map(({ id }) => id).join(' '),
    weakestSignalToNoise: used.length === 0 ? null : Math.min(...used.map((fit) => fit.area / fit.areaSigma)),
  };
  const tail = weak.length === 0 ? '' : ` ${listNames(weak.map(({ id }) => id))} take part as faint lines.`;
  const text =
    strong.length === 0
      ? 'No usable Balmer line stands five sigma out of the noise.'
      : `${listNames(strong.map(({ id }) => id))} ${strong.length === 1 ? 'stands' : 'stand'} more than five sigma out of the noise.${tail}`;
  return {
    id: 'line-significance',
    verdict: strong.length >= 3 ? 'sound' : strong.length === 2 ? 'use with care' : 'not defensible',
    facts,
    text,
    remedy:
      strong.length >= 3
        ? ''
        : 'Expose longer or average more recordings so that three lines stand clear of the noise.',
  };
}

/** Whether the profile describes the lines to within their noise. */
export function profileCheck(evidence: Evidence): Check {
  const { fits } = evidence;
  const used = usedFits(evidence);
  const widened = used.filter(({ widening }) => widening > 1);
  const worst = used.reduce((most, { widening }) => Math.max(most, widening), 1);
  const facts = {
    sharing: fits.sharing,
    chiSquare: fits.chiSquare,
    degreesOfFreedom: fits.degreesOfFreedom,
    worstWidening: worst,
    status: fits.status,
  };
  if (fits.status !== 'converged') {
    const isAbsent = fits.status === 'not-fitted';
    return {
      id: 'profile-fit',
      verdict: 'not defensible',
      facts,
      text: isAbsent
        ? 'No line was fitted.'
        : `The line fit ended as "${fits.status}", so its areas are not used.`,
      remedy: isAbsent ? '' : 'Look at the line charts for a disturbed line and leave it out.',
    };
  }
  if (widened.length === 0 && fits.sharing === 'shared') {
    return {
      id: 'profile-fit',
      verdict: 'sound',
      facts,
      text: `One width law and one axis describe all lines (chi-square ${plain(fits.chiSquare, 3)} for ${String(fits.degreesOfFreedom)} degrees of freedom).`,
      remedy: '',
    };
  }
  const own =
    fits.sharing === 'own' ? 'The lines do not share one width, so each was fitted with its own. ' : '';
  const misfit =
    widened.length === 0
      ? ''
      : `The profile misses ${listNames(widened.map(({ id }) => id))} by more than noise; uncertainties were widened up to ${plain(worst, 2)} times.`;
  return {
    id: 'profile-fit',
    verdict: 'use with care',
    facts,
    text: `${own}${misfit}`.trim(),
    remedy: 'Measure the instrument profile with a reference lamp and check focus and slit.',
  };
}

/** Unassigned peaks too close to a line, impurities known to lie under one, and lines of an odd shape. */
export function blendCheck(evidence: Evidence): Check {
  const { fits, identification } = evidence;
  const used = new Set(usedFits(evidence).map(({ id }) => id));
  const near = [...fits.neighbours.keys()].filter((id) => used.has(id));
  const fitted = plainCompanions(fits).filter(({ lineId }) => used.has(lineId));
  const suspects = knownBlends.filter(
    ({ lineId, species }) =>
      used.has(lineId) &&
      identification?.impurities.some((finding) => finding.species === species) &&
      !fitted.some((companion) => companion.lineId === lineId && companion.species.startsWith(species)),
  );
  // A neighbour without a name, or one that outshines its host, leaves the host's area to the model of it.
  const doubtful = fitted.filter(
    ({ species, lineId, area }) =>
      species === 'unknown' ||
      // Beside the line, not under it.
      (species !== neighbourSpecies && area > 0.3 * fits.fits.find(({ id }) => id === lineId)!.area),
  );
  // Where most lines fit and one does not, the odd one has company; where many do not, it is the instrument.
  const misfits = fits.fits.filter(({ widening }) => widening > oddShape).map(({ id }) => id);
  const odd = 2 * misfits.length < fits.fits.length ? misfits.filter((id) => !near.includes(id)) : [];
  const facts = {
    neighbours: near.join(' '),
    suspects: suspects.map(({ lineId, species }) => `${species} under ${lineId}`).join(', '),
    oddShapes: odd.join(' '),
    fitted: fitted.map(({ lineId, species }) => `${species} under ${lineId}`).join(', '),
  };
  const parts = fitted.map(companionWords);
  if (near.length + suspects.length + odd.length + doubtful.length === 0) {
    return {
      id: 'blends',
      verdict: 'sound',
      facts,
      text: parts.length === 0 ? 'No other line was found under a line in use.' : sentence(parts),
      remedy: '',
    };
  }
  if (near.length > 0) parts.push(`an unassigned peak lies beside ${listNames(near)}`);
  if (odd.length > 0)
    parts.push(`${listNames(odd)} lacks the shape of the other lines, as with another line under it`);
  for (const { lineId, species, interfererNm } of suspects) {
    parts.push(`${species} is present and has a line at ${plain(interfererNm, 6)} nm under ${lineId}`);
  }
  return {
    id: 'blends',
    verdict: 'use with care',
    facts,
    text: sentence(parts),
    remedy: 'Leave the blended line out and see whether the temperature moves, or remove the impurity.',
  };
}

const sentence = (parts: readonly string[]): string => {
  const text = parts.join('; ');
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}.`;
};

/** Lines within a bench instrument's width of a Balmer line, nm in air; sources in assets/lines. */
const knownBlends: readonly { lineId: string; species: string; interfererNm: number }[] = [
  { lineId: 'H-gamma', species: 'Hg', interfererNm: 433.922 },
  { lineId: 'H-gamma', species: 'N2', interfererNm: 434.36 },
  { lineId: 'H-epsilon', species: 'Ca', interfererNm: 396.847 },
  { lineId: 'H-8', species: 'He', interfererNm: 388.865 },
  { lineId: 'H-10', species: 'N2', interfererNm: 380.49 },
];
