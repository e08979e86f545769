import type { CompanionLine, LineFits } from '../lines/line-fit.ts';
import { neighbourSpecies } from '../lines/companion.ts';
import { plain } from './plain-number.ts';

/** Standard deviations: bands of a species are fitted together, and those that do not show by themselves go unnamed. */
const leastPlain = 3;

/** Light of other species that was fitted with the Balmer lines and is plain by itself. */
export const plainCompanions = ({ companions }: LineFits): readonly CompanionLine[] =>
  companions.filter(({ area, areaSigma }) => area > leastPlain * areaSigma);

/** "light at the place of Hg I (433.922 nm) was fitted together with H-gamma". */
export function companionWords({ lineId, species, referenceNm }: CompanionLine): string {
  const place = `${plain(referenceNm, 6)} nm`;
  if (species === neighbourSpecies) return `a line at ${place} beside ${lineId} was fitted along with it`;
  const light = species === 'unknown' ? 'light of an unknown line' : `light at the place of ${species}`;
  return `${light} (${place}) was fitted together with ${lineId}`;
}
