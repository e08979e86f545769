import type { Bench } from '../../shared-core/bench/bench.ts';
import { createRandom } from '../../shared-core/numeric/random.ts';
import { exp } from '../../shared-core/numeric/portable-math.ts';
import { boltzmannEvPerK } from '../../shared-core/physics/constants.ts';
import { hydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import { hBetaStarkFwhmNm, hBetaStarkRelativeSigma } from '../../shared-core/physics/stark.ts';
import { defaultAnalysisOptions, diagnose } from '../../shared-core/pipeline/diagnose.ts';
import type { ResponseTable } from '../../shared-core/recording/recording.ts';
import { simulateRecording, type SimulationInput } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from '../support/diagnose-simulated.ts';
import { temperatureBoundK } from '../support/fisher-bound.ts';

/** One way in which recordings can be hard, with known truth. */
export interface CoverageCase {
  readonly name: string;
  readonly kelvin: number;
  readonly electronsPerCubicMetre: number;
  readonly input?: Partial<SimulationInput>;
  /** What the export does to the recorded counts. */
  readonly exported?: (signal: Float64Array) => Float64Array;
  /** What the person knows; the simulated bench itself when absent. */
  readonly bench?: Bench;
  /** The true response is drawn from this table's stated covariance. */
  readonly response?: { readonly relativeSigma: number; readonly correlationLengthNm: number };
  /** Standard uncertainty of the temperature that the noise alone forces on any method, K; null where none was worked out. */
  readonly boundK: number | null;
}

export interface CoverageResult {
  readonly name: string;
  readonly drawCount: number;
  readonly measured: number;
  readonly covered: number;
  readonly meanPull: number;
  readonly rmsPull: number;
  readonly rmsKelvin: number;
  readonly rmsOverBound: number | null;
  readonly densityMeasured: number;
  readonly densityCovered: number;
  readonly densityMeanPull: number;
  readonly verdicts: ReadonlyMap<string, number>;
}

const bright = 240_000;
const faint = 4000;
const continuumElectrons = 20;
const rangeNm = [370, 700] as const;

const bound = (kelvin: number, brightestPixelElectrons: number, electronsPerCubicMetre: number): number =>
  temperatureBoundK({
    kelvin,
    brightestPixelElectrons,
    continuumElectrons,
    starkFwhmNm: hBetaStarkFwhmNm(electronsPerCubicMetre),
    fwhmNm: Math.hypot(0.18, 0.0129),
    fwhmSigmaNm: 0.004,
    readNoiseElectrons: 12,
    gainElectronsPerCount: 5,
    pixelNm: 330 / 3647,
    firstNm: 370,
    halfWindowNm: 2.5,
  });

/** Light of a Balmer line over that of H-alpha. */
function relativeLight(level: number, kelvin: number): number {
  const [alpha, line] = [hydrogenLine(3), hydrogenLine(level)];
  return (
    ((line.upperWeight * line.transitionProbabilityPerS) /
      (alpha.upperWeight * alpha.transitionProbabilityPerS)) *
    exp((alpha.upperEnergyEv - line.upperEnergyEv) / (boltzmannEvPerK * kelvin))
  );
}

const runningMean = (signal: Float64Array, points: number): Float64Array =>
  signal.map((_, i) => {
    let sum = 0;
    for (let k = -(points >> 1); k <= points >> 1; k++)
      sum += signal[Math.max(0, Math.min(signal.length - 1, i + k))]!;
    return sum / points;
  });

/** Full scale of the eight-bit case, counts: a twentieth above the brightest pixel. */
const eightBitScale = (1000 + bright / 5) * 1.05;

export const coverageCases: readonly CoverageCase[] = [
  { name: 'bright', kelvin: 7000, electronsPerCubicMetre: 1e20, boundK: bound(7000, bright, 1e20) },
  {
    name: 'faint',
    kelvin: 7000,
    electronsPerCubicMetre: 1e20,
    input: { brightestPixelElectrons: faint },
    boundK: bound(7000, faint, 1e20),
  },
  { name: 'dense', kelvin: 9000, electronsPerCubicMetre: 1e22, input: { rangeNm: [350, 720] }, boundK: null },
  {
    name: 'curved response',
    kelvin: 7000,
    electronsPerCubicMetre: 1e20,
    response: { relativeSigma: 0.03, correlationLengthNm: 80 },
    boundK: null,
  },
  {
    name: 'deuterium 20 %',
    kelvin: 7000,
    electronsPerCubicMetre: 1e20,
    input: { deuteriumRatio: 0.25 },
    boundK: null,
  },
  {
    name: 'blended',
    kelvin: 7000,
    electronsPerCubicMetre: 1e20,
    input: {
      extraLines: [
        { wavelengthNm: 433.922, relativeArea: 0.3 * relativeLight(5, 7000) },
        { wavelengthNm: 396.847, relativeArea: 0.5 * relativeLight(7, 7000) },
      ],
    },
    boundK: null,
  },
  {
    name: 'smoothed over 5',
    kelvin: 7000,
    electronsPerCubicMetre: 1e20,
    exported: (signal) => runningMean(signal, 5),
    boundK: null,
  },
  {
    name: '8-bit',
    kelvin: 7000,
    electronsPerCubicMetre: 1e20,
    exported: (signal) =>
      signal.map((value) => Math.min(255, Math.max(0, Math.round((value / eightBitScale) * 255)))),
    bench: { instrument: knownBench.instrument! },
    boundK: null,
  },
];

/** Draws and diagnoses; every draw has its own noise, axis phase, Stark law error and, where stated, response. */
export function runCoverageCase(
  { name, kelvin, electronsPerCubicMetre, input, exported, bench, response, boundK }: CoverageCase,
  drawCount: number,
  change: Partial<NonNullable<Bench['analysis']>> = {},
): CoverageResult {
  let measured = 0;
  let covered = 0;
  let pulls = 0;
  let squaredPulls = 0;
  let squares = 0;
  let densityMeasured = 0;
  let densityCovered = 0;
  let densityPulls = 0;
  const verdicts = new Map<string, number>();
  for (let index = 0; index < drawCount; index++) {
    const seed = 500_000 + 7 * index;
    const random = createRandom(seed + 1);
    const [first, last] = input?.rangeNm ?? rangeNm;
    const shiftNm = 0.09 * random.uniform();
    // One error of the width law for all lines of a draw.
    const starkFactor = exp(hBetaStarkRelativeSigma * random.normal());
    const simulated = simulateRecording({
      bench: knownBench,
      kelvin,
      electronsPerCubicMetre,
      seed,
      brightestPixelElectrons: bright,
      continuumElectrons,
      starkFactorOf: () => starkFactor,
      ...input,
      rangeNm: [first + shiftNm, last + shiftNm],
      ...(response === undefined ? {} : { responseAt: drawResponse(random, response) }),
    });
    const known = bench ?? knownBench;
    const result = diagnose({
      recording: asRecording(simulated.wavelengthNm, exported?.(simulated.signal) ?? simulated.signal),
      dark: null,
      response: response === undefined ? null : flatTable(response.relativeSigma),
      bench: {
        ...known,
        ...(response === undefined
          ? {}
          : { response: { file: 'response.csv', correlationLengthNm: response.correlationLengthNm } }),
        analysis: { ...known.analysis, ...change },
      },
      options: defaultAnalysisOptions,
      lineTable: [],
      programVersion: '0',
    });
    if (!result.ok) throw new Error(result.problem.code);
    const { temperature, electronDensity, verdict } = result.value.diagnosis;
    verdicts.set(verdict, (verdicts.get(verdict) ?? 0) + 1);
    if (temperature.kelvin !== null) {
      measured++;
      const error = temperature.kelvin - kelvin;
      if (temperature.lowKelvin! <= kelvin && kelvin <= temperature.highKelvin!) covered++;
      pulls += error / temperature.sigmaKelvin!;
      squaredPulls += (error / temperature.sigmaKelvin!) ** 2;
      squares += error * error;
    }
    const { perCubicMetre, lowPerCubicMetre: low, highPerCubicMetre: high } = electronDensity;
    if (perCubicMetre !== null) {
      densityMeasured++;
      if (low! <= electronsPerCubicMetre && electronsPerCubicMetre <= high!) densityCovered++;
      const halfWidth = Math.log(high! / low!) / 2 / 1.96;
      densityPulls += Math.log(perCubicMetre / electronsPerCubicMetre) / halfWidth;
    }
  }
  const rmsKelvin = Math.sqrt(squares / measured);
  return {
    name,
    drawCount,
    measured,
    covered,
    meanPull: pulls / measured,
    rmsPull: Math.sqrt(squaredPulls / measured),
    rmsKelvin,
    rmsOverBound: boundK === null ? null : rmsKelvin / boundK,
    densityMeasured,
    densityCovered,
    densityMeanPull: densityPulls / densityMeasured,
    verdicts,
  };
}

/** ln(response) as a Gaussian process with exponential correlation, drawn on a 5 nm grid and joined by straight lines. */
function drawResponse(
  random: ReturnType<typeof createRandom>,
  { relativeSigma, correlationLengthNm }: NonNullable<CoverageCase['response']>,
): (nm: number) => number {
  const stepNm = 5;
  const firstNm = 340;
  const keep = exp(-stepNm / correlationLengthNm);
  const nodes = [relativeSigma * random.normal()];
  while (firstNm + stepNm * nodes.length < 740)
    nodes.push(keep * nodes.at(-1)! + relativeSigma * Math.sqrt(1 - keep * keep) * random.normal());
  return (nm) => {
    const at = (nm - firstNm) / stepNm;
    const low = Math.min(nodes.length - 2, Math.max(0, Math.floor(at)));
    return exp(nodes[low]! + (at - low) * (nodes[low + 1]! - nodes[low]!));
  };
}

const flatTable = (relativeSigma: number): ResponseTable => ({
  name: 'response.csv',
  sha256: '',
  wavelengthNm: Float64Array.from([300, 800]),
  response: Float64Array.from([1, 1]),
  relativeSigma: Float64Array.from([relativeSigma, relativeSigma]),
});
