import { exp } from '../numeric/portable-math.ts';
import type { SpectralLine } from '../physics/spectral-line.ts';

/** A line or bandhead as this instrument would show it: lines of one species too close to part are one feature. */
export interface Feature {
  readonly lines: readonly SpectralLine[];
  /** Where its top may be found, nm in air, before the uncertainty of the peak itself. */
  readonly fromNm: number;
  readonly toNm: number;
  readonly centreNm: number;
  /** Photon strength against the other features of the species; an order of magnitude. */
  readonly strength: number;
  /** eV, where the strength was computed with it; null where it is that of common lamps. */
  readonly upperEnergyEv: number | null;
}

/** One kind of emitter with the features this recording could show, strongest first. */
export interface Emitter {
  readonly species: string;
  /** "Hg I", "N2". */
  readonly name: string;
  readonly features: readonly Feature[];
}

export interface Instrument {
  readonly fwhmNm: number;
  readonly rangeNm: readonly [number, number];
  /** Places where nothing else can be told apart. */
  readonly balmerLinesNm: readonly number[];
}

/** Distribution temperature that ranks the lines of an atom, as k T in eV: 7000 K. */
const rankingEv = 0.6;
/** Table uncertainty of bandheads, nm. */
const bandheadSigmaNm = 0.05;
/** Hydrogen and deuterium are the subject of the measurement, not an impurity. */
const ownSpecies: readonly string[] = ['H', 'D', 'H2'];

/** The emitters of the table with their features inside the range and clear of the Balmer lines. */
export function emittersInRange(
  lineTable: readonly SpectralLine[],
  instrument: Instrument,
): readonly Emitter[] {
  const byName = new Map<string, SpectralLine[]>();
  for (const line of lineTable) {
    if (ownSpecies.includes(line.species)) continue;
    const name = emitterName(line);
    byName.set(name, [...(byName.get(name) ?? []), line]);
  }
  return [...byName]
    .map(([name, lines]) => ({
      species: lines[0]?.species ?? name,
      name,
      features: featuresOf(lines, instrument),
    }))
    .filter(({ features }) => features.length > 0);
}

function emitterName({ species, ionStage }: SpectralLine): string {
  return ionStage === 'mol' ? species : `${species} ${ionStage}`;
}

function featuresOf(lines: readonly SpectralLine[], instrument: Instrument): readonly Feature[] {
  const { fwhmNm, rangeNm } = instrument;
  const groups: SpectralLine[][] = [];
  for (const line of [...lines].sort((a, b) => a.wavelengthAirNm - b.wavelengthAirNm)) {
    const last = groups.at(-1);
    const nearest = last?.at(-1);
    if (
      last !== undefined &&
      nearest !== undefined &&
      line.wavelengthAirNm - nearest.wavelengthAirNm < fwhmNm
    ) {
      last.push(line);
    } else groups.push([line]);
  }
  return groups
    .map((group) => toFeature(group, fwhmNm))
    .filter(({ fromNm, toNm }) => fromNm - fwhmNm >= rangeNm[0] && toNm + fwhmNm <= rangeNm[1])
    .filter(({ centreNm }) => !isHiddenByBalmer(centreNm, instrument))
    .sort((a, b) => b.strength - a.strength);
}

function toFeature(lines: readonly SpectralLine[], fwhmNm: number): Feature {
  const strengths = lines.map(strengthOf);
  const strength = strengths.reduce((sum, value) => sum + value, 0);
  const centreNm = lines.reduce((sum, line, i) => sum + (line.wavelengthAirNm * strengths[i]!) / strength, 0);
  const lowest = lines[0]!;
  const highest = lines.at(-1)!;
  // A head shaded to the violet has its top below the head, by up to half the instrument width.
  const isBand = lowest.kind === 'bandhead';
  return {
    lines,
    fromNm: lowest.wavelengthAirNm - (isBand ? bandheadSigmaNm + 0.5 * fwhmNm : 0),
    toNm: highest.wavelengthAirNm + (isBand ? bandheadSigmaNm : 0),
    centreNm,
    strength,
    upperEnergyEv: lowest.relativeStrength === null ? lowest.upperEnergyEv : null,
  };
}

function strengthOf({
  relativeStrength,
  transitionProbabilityPerS,
  upperWeight,
  upperEnergyEv,
}: SpectralLine): number {
  if (relativeStrength !== null) return relativeStrength;
  if (transitionProbabilityPerS === null || upperEnergyEv === null) return 1;
  return transitionProbabilityPerS * (upperWeight ?? 1) * exp(-upperEnergyEv / rankingEv);
}

/** Whether a place lies within one instrument width of a Balmer line. */
export function isHiddenByBalmer(nm: number, { balmerLinesNm, fwhmNm }: Instrument): boolean {
  return balmerLinesNm.some((balmer) => Math.abs(nm - balmer) < fwhmNm);
}
