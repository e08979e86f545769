import type { Check } from '../diagnosis.ts';
import { listNames, type Evidence } from '../evidence.ts';
import { plain } from '../plain-number.ts';

/** Lines that take light out instead of adding it; null where there are none. */
export function absorptionCheck({ fits }: Evidence): Check | null {
  const absorbed: string[] = [];
  const reversed: string[] = [];
  let strongest = 0;
  for (const [id, obstacle] of fits.obstacles) {
    if (obstacle.kind !== 'absorption' && obstacle.kind !== 'self-reversal') continue;
    (obstacle.kind === 'absorption' ? absorbed : reversed).push(id);
    strongest = Math.max(strongest, obstacle.significance);
  }
  if (absorbed.length + reversed.length === 0) return null;
  const seen = [
    ...(absorbed.length === 0 ? [] : [`${listNames(absorbed)} below the continuum`]),
    ...(reversed.length === 0 ? [] : [`a dip in the middle of ${listNames(reversed)}`]),
  ];
  return {
    id: 'absorption',
    verdict: 'use with care',
    facts: {
      absorbedLines: absorbed.join(' '),
      reversedLines: reversed.join(' '),
      significance: strongest,
    },
    text: `Found ${seen.join(' and ')} (up to ${plain(strongest, 2)} sigma); gas absorbs there, so left out of the temperature.`,
    remedy:
      reversed.length > 0
        ? 'Look across the tube, away from its cooler ends, or run it at a lower current.'
        : 'Keep light of other sources out of the line of sight, or bring this in as the recording through the tube.',
  };
}
