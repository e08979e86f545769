import type { Bench } from '../../shared-core/bench/bench.ts';
import type { ExtraLine, SimulationInput } from '../../shared-core/simulation/simulation-input.ts';
import { knownBench } from '../support/diagnose-simulated.ts';
import { molecularBackground } from '../support/molecular-background.ts';
import { fisherBounds, type Bounds, type FisherInput } from '../support/fisher-bound.ts';

/** One way in which recordings can be hard, with known truth. */
export interface CoverageCase {
  readonly name: string;
  readonly kelvin: number;
  readonly electronsPerCubicMetre: number;
  readonly input: Partial<SimulationInput> & { readonly rangeNm: readonly [number, number] };
  /** What the person knows; the bench of the simulation when absent. */
  readonly bench?: Bench;
  /** The true response is drawn from what this table states of its errors. */
  readonly response?: { readonly relativeSigma: number; readonly correlationLengthNm: number };
  /** Beyond the effects of the case. */
  readonly bound: Partial<FisherInput>;
}

export const bright = 240_000;
export const faint = 4000;
const continuumElectrons = 20;
const rangeNm = [370, 700] as const;

/** Mercury and calcium in the wings of H-gamma and H-epsilon. */
const neighbours = [
  { wavelengthNm: 433.922, relativeArea: 0.3, relativeTo: 5 },
  { wavelengthNm: 396.847, relativeArea: 0.5, relativeTo: 7 },
] as const satisfies readonly ExtraLine[];

/** A twentieth above the brightest pixel, so that eight bits are used as a careful user would use them. */
const eightBitSaturation = (1000 + bright / 5) * 1.05;

const ordinary = (
  name: string,
  change: Partial<Omit<CoverageCase, 'input'>> & { readonly input?: Partial<SimulationInput> } = {},
): CoverageCase => ({
  name,
  kelvin: 7000,
  electronsPerCubicMetre: 1e21,
  bound: {},
  ...change,
  input: { brightestPixelElectrons: bright, continuumElectrons, rangeNm, ...change.input },
});

export const coverageCases: readonly CoverageCase[] = [
  ordinary('bright'),
  ordinary('faint', { input: { brightestPixelElectrons: faint } }),
  ordinary('dense', { kelvin: 9000, electronsPerCubicMetre: 1e22, input: { rangeNm: [350, 720] } }),
  ordinary('curved response', { response: { relativeSigma: 0.03, correlationLengthNm: 80 } }),
  ordinary('deuterium 20 %', { input: { deuteriumRatio: 0.25 }, bound: { deuteriumRatio: 0.25 } }),
  ordinary('blended', {
    input: { extraLines: neighbours },
    bound: {
      companions: neighbours.map(({ wavelengthNm, relativeTo, relativeArea }) => ({
        nm: wavelengthNm,
        level: relativeTo,
        relativeArea,
      })),
    },
  }),
  ordinary('smoothed over 5', { input: { smoothingPoints: 5 } }),
  ordinary('8-bit', {
    input: {
      levels: 255,
      bench: { ...knownBench, detector: { ...knownBench.detector, saturationCounts: eightBitSaturation } },
    },
    bench: { instrument: knownBench.instrument },
    // A step of the export in electrons.
    bound: { gainElectronsPerCount: (eightBitSaturation / 255) * 5 },
  }),
  ordinary('molecular background', { input: { backgroundAt: molecularBackground(1000) } }),
];

/** What the noise, and what is believed beforehand, force on any method that may use every pixel near a line. */
export const boundsOf = ({
  kelvin,
  electronsPerCubicMetre,
  input,
  response,
  bound,
}: CoverageCase): Bounds => {
  const [firstNm, lastNm] = input.rangeNm;
  return fisherBounds({
    kelvin,
    electronsPerCubicMetre,
    brightestPixelElectrons: input.brightestPixelElectrons!,
    continuumElectrons,
    fwhmNm: Math.hypot(0.18, 0.0129),
    fwhmSigmaNm: 0.004,
    readNoiseElectrons: 12,
    gainElectronsPerCount: 5,
    pixelNm: (lastNm - firstNm) / 3647,
    firstNm,
    lastNm,
    halfWindowNm: 2.5,
    starkErrors: true,
    ...(response === undefined ? {} : { response }),
    ...bound,
  });
};
