import { exp, log } from '../numeric/portable-math.ts';
import type { SpectralLine } from '../physics/spectral-line.ts';

/** A line or bandhead as this instrument would show it: lines of one species too close to part are one feature. */
export interface Feature {
  readonly lines: readonly SpectralLine[];
  /** nm in air, of the outermost lines. */
  readonly fromNm: number;
  readonly toNm: number;
  /** nm in air: mean by strength. */
  readonly centreNm: number;
  readonly toleranceNm: number;
  readonly shape: FeatureShape;
  /** Photon strength against the other features of the species; an order of magnitude. */
  readonly strength: number;
  /** eV, where the strength was computed with it; null where it is that of common lamps. */
  readonly upperEnergyEv: number | null;
}

/** 'line': as the instrument draws a narrow line. 'violet', 'red': a head that fades to that side. */
export type FeatureShape = 'line' | 'violet' | 'red';

/** One kind of emitter with its features, strongest first. */
export interface Emitter {
  readonly species: string;
  /** "Hg I", "N2". */
  readonly name: string;
  readonly features: readonly Feature[];
  /** What it means at the bench. */
  readonly meaning: string;
}

/** Distribution temperature that ranks the lines of an atom, as k T in eV: 7000 K. */
const rankingEv = 0.6;
/** Atoms of hydrogen and deuterium are the subject of the measurement. */
const ownSpecies: readonly string[] = ['H', 'D'];

/** Line widths are rounded to steps of 6 %, so that recordings of one instrument share their features. */
const widthStep = 0.06;
/** What was last made of a table is kept beside it. */
const lastMade = new WeakMap<readonly SpectralLine[], { widthIndex: number; emitters: readonly Emitter[] }>();

/** The emitters of the table with their features for an instrument of this width, nm. */
export function emittersOf(lineTable: readonly SpectralLine[], fwhmNm: number): readonly Emitter[] {
  const widthIndex = Math.round(log(fwhmNm) / widthStep);
  const last = lastMade.get(lineTable);
  if (last?.widthIndex === widthIndex) return last.emitters;
  const roundedNm = exp(widthIndex * widthStep);
  const byName = new Map<string, SpectralLine[]>();
  for (const line of lineTable) {
    if (ownSpecies.includes(line.species)) continue;
    const name = line.ionStage === 'mol' ? line.species : `${line.species} ${line.ionStage}`;
    byName.set(name, [...(byName.get(name) ?? []), line]);
  }
  const emitters = [...byName].map(([name, lines]) => ({
    species: lines[0]!.species,
    name,
    features: featuresOf(lines, roundedNm),
    meaning: lines[0]!.meaning.split(';')[0]!,
  }));
  lastMade.set(lineTable, { widthIndex, emitters });
  return emitters;
}

function featuresOf(lines: readonly SpectralLine[], fwhmNm: number): readonly Feature[] {
  const groups: SpectralLine[][] = [];
  for (const line of [...lines].sort((a, b) => a.wavelengthAirNm - b.wavelengthAirNm)) {
    const last = groups.at(-1);
    const nearest = last?.at(-1);
    if (
      last !== undefined &&
      nearest !== undefined &&
      shapeOf(nearest) === shapeOf(line) &&
      line.wavelengthAirNm - nearest.wavelengthAirNm < fwhmNm
    ) {
      last.push(line);
    } else groups.push([line]);
  }
  return groups.map(toFeature).sort((a, b) => b.strength - a.strength);
}

const shapeOf = ({ shading }: SpectralLine): FeatureShape =>
  shading === 'violet' || shading === 'red' ? shading : 'line';

function toFeature(lines: readonly SpectralLine[]): Feature {
  const strengths = lines.map(strengthOf);
  const strength = strengths.reduce((sum, value) => sum + value, 0);
  const lowest = lines[0]!;
  return {
    lines,
    fromNm: lowest.wavelengthAirNm,
    toNm: lines.at(-1)!.wavelengthAirNm,
    centreNm: lines.reduce((sum, line, i) => sum + (line.wavelengthAirNm * strengths[i]!) / strength, 0),
    toleranceNm: Math.max(...lines.map((line) => line.wavelengthToleranceNm)),
    shape: shapeOf(lowest),
    strength,
    upperEnergyEv: lowest.relativeStrength === null ? lowest.upperEnergyEv : null,
  };
}

function strengthOf(line: SpectralLine): number {
  const { relativeStrength, transitionProbabilityPerS, upperWeight, upperEnergyEv } = line;
  if (relativeStrength !== null) return relativeStrength;
  if (transitionProbabilityPerS === null || upperEnergyEv === null) return 1;
  return transitionProbabilityPerS * (upperWeight ?? 1) * exp(-upperEnergyEv / rankingEv);
}
