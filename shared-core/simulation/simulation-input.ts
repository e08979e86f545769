import type { Bench } from '../bench/bench.ts';

/** What to simulate; everything but temperature, density and seed has a default, see `simulationDefaults`. */
export interface SimulationInput {
  /** Instrument, detector, axis and lamp; missing fields take the defaults below. */
  readonly bench: Bench;
  readonly kelvin: number;
  readonly electronsPerCubicMetre: number;
  /** Whole number, 0 to 2^32 - 1: the same seed gives the same recording. */
  readonly seed: number;
  readonly pixelCount?: number;
  /** nm of the first and last pixel; used when the bench gives no axis coefficients. */
  readonly rangeNm?: readonly [number, number];
  /** Expected electrons in the brightest pixel. */
  readonly brightestPixelElectrons?: number;
  /** Continuum under the lines, electrons per pixel. */
  readonly continuumElectrons?: number;
  /** Relative response, counts per photon, at a wavelength in nm; flat when absent. */
  readonly responseAt?: (nm: number) => number;
  /** What the axis writes instead of the true wavelength, both nm. */
  readonly recordedNm?: (trueNm: number) => number;
  /** Relative population per sublevel of each upper level, in place of exp(-E/kT). */
  readonly populationOf?: (upperLevel: number) => number;
  /** Optical depth at the peak of H-alpha of a homogeneous tube; the other lines follow. */
  readonly hAlphaOpticalDepth?: number;
  /** Atoms of deuterium per atom of hydrogen in every level; none when absent. */
  readonly deuteriumRatio?: number;
  /** Stark width of a line over that of its width law, to play errors of the laws; 1 when absent. */
  readonly starkFactorOf?: (upperLevel: number) => number;
  /** Further lines, as narrow as the instrument. */
  readonly extraLines?: readonly ExtraLine[];
  /** Light under the lines besides the continuum, electrons per pixel at a true wavelength in nm. */
  readonly backgroundAt?: (nm: number) => number;
  /** Points of the running mean over the counts, odd, as exports are smoothed; the ends repeat. */
  readonly smoothingPoints?: number;
  /** Steps into which the export divides the range from 0 to saturation, 255 for eight bits; counts as they are when absent. */
  readonly levels?: number;
}

export interface ExtraLine {
  /** True wavelength. */
  readonly wavelengthNm: number;
  /** Over that of a Balmer line of hydrogen in a thin tube. */
  readonly relativeArea: number;
  /** Upper level of that line; 3 when absent. */
  readonly relativeTo?: number;
}

export const simulationDefaults = Object.freeze({
  pixelCount: 3648,
  rangeNm: Object.freeze([370, 700] as const),
  instrumentFwhmNm: 0.18,
  gainElectronsPerCount: 5,
  readNoiseElectrons: 12,
  offsetCounts: 1000,
  saturationCounts: 65535,
  /** Of full scale, for the brightest pixel. */
  brightestShare: 0.75,
});
