import type { Claim } from './judge-emitter.ts';
import type { Measurement } from './measure-feature.ts';

/** A species that the recording shows by several of its lines. */
export interface ImpurityFinding {
  readonly species: string;
  /** "Hg I", "N2". */
  readonly emitter: string;
  /** "Hg I 435.83 nm, 546.07 nm and 3 more; 5 of 6 lines in range"; bands name their system and levels. */
  readonly evidence: string;
  /** Of the strongest line. */
  readonly signalToNoise: number;
  readonly meaning: string;
  readonly linesSeen: number;
  /** Lines in range that should stand out, those seen included. */
  readonly linesExpected: number;
  /** That noise and stray lines look like this, all species looked for counted; at most 0.01. */
  readonly chanceProbability: number;
  readonly confidence: 'sure' | 'likely';
}

/** A claim is sure when chance is this unlikely and most lines are there; own choice. */
const sureChance = 1e-5;
const sureShare = 0.6;
const namedPlaces = 4;

/** Words for a claim. */
export function describeClaim(claim: Claim, chanceProbability: number): ImpurityFinding {
  const { emitter, agreeing, expectedCount } = claim;
  const order = [...agreeing].sort((a, b) => b.signalToNoise - a.signalToNoise);
  const places = order.slice(0, namedPlaces).map((each, index) => placeOf(each, index === 0));
  const more = order.length > namedPlaces ? ` and ${String(order.length - namedPlaces)} more` : '';
  const isBand = order[0]!.feature.lines[0]!.kind === 'bandhead';
  const shaded = order.filter(({ shading }) => shading === 'seen').length;
  const tails = shaded > 0 ? `, the shading seen at ${String(shaded)}` : '';
  const isFull = agreeing.length >= sureShare * expectedCount;
  return {
    species: emitter.species,
    emitter: emitter.name,
    evidence: `${emitter.name} ${places.join(', ')}${more}; ${String(agreeing.length)} of ${String(expectedCount)} ${isBand ? 'bandheads' : 'lines'} in range${tails}`,
    signalToNoise: order[0]!.signalToNoise,
    meaning: emitter.meaning,
    linesSeen: agreeing.length,
    linesExpected: expectedCount,
    chanceProbability,
    confidence: chanceProbability <= sureChance && isFull ? 'sure' : 'likely',
  };
}

/** "435.83 nm", "second positive C-B (0-0) 337.1 nm"; after the first only "(0-1) 357.7 nm". */
function placeOf({ feature, isUnderHydrogen }: Measurement, isFirst: boolean): string {
  const { lines, centreNm } = feature;
  const transition = lines[0]!.transition.split(',')[0]!;
  const under = isUnderHydrogen ? ' (under a line of hydrogen)' : '';
  if (transition === '') return `${centreNm.toFixed(2)} nm${under}`;
  return `${isFirst ? transition : transition.replace(/^[^(]*/, '')} ${centreNm.toFixed(1)} nm${under}`;
}
