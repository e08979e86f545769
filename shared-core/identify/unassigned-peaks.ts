import type { StrayPeaks } from './chance.ts';
import type { Emitter } from './emitters.ts';

/** Peaks that neither hydrogen atoms nor any species claimed explains. */
export interface UnassignedPeaks {
  readonly count: number;
  /** Of them between 430 and 500 nm, around H-beta and H-gamma. */
  readonly nearBalmerCount: number;
  /** The strongest, by strength. */
  readonly strongest: readonly UnassignedPeak[];
}

export interface UnassignedPeak {
  /** nm in air, registered axis. */
  readonly wavelengthNm: number;
  readonly signalToNoise: number;
  /** "Na I 589.19 nm": main lines of species that lie there. One coincidence claims nothing. */
  readonly candidates: readonly string[];
}

const leastSignalToNoise = 5;
const listedCount = 8;
/** Only the main lines of a species are worth naming. */
const mainLines = 3;

export function unassignedPeaks(input: {
  readonly peaks: StrayPeaks['places'];
  readonly airNm: (recordedNm: number) => number;
  readonly emitters: readonly Emitter[];
  readonly fwhmNm: number;
  readonly axisSigmaNm: (airNm: number) => number;
}): UnassignedPeaks {
  const { peaks, airNm, emitters, fwhmNm, axisSigmaNm } = input;
  const open = peaks
    .filter(({ signalToNoise }) => signalToNoise >= leastSignalToNoise)
    .map(({ recordedNm, signalToNoise }) => ({ wavelengthNm: airNm(recordedNm), signalToNoise }))
    .sort((a, b) => b.signalToNoise - a.signalToNoise);
  const strongest = open.slice(0, listedCount).map(({ wavelengthNm, signalToNoise }) => {
    const reach = 0.25 * fwhmNm + 2.5 * axisSigmaNm(wavelengthNm);
    const candidates: string[] = [];
    for (const { name, features } of emitters) {
      const near = features
        .slice(0, mainLines)
        .find(
          ({ fromNm, toNm, toleranceNm }) =>
            wavelengthNm > fromNm - toleranceNm - reach && wavelengthNm < toNm + toleranceNm + reach,
        );
      if (near !== undefined) candidates.push(`${name} ${near.centreNm.toFixed(2)} nm`);
    }
    return { wavelengthNm, signalToNoise, candidates };
  });
  const nearBalmer = open.filter(({ wavelengthNm }) => wavelengthNm > 430 && wavelengthNm < 500);
  return { count: open.length, nearBalmerCount: nearBalmer.length, strongest };
}
