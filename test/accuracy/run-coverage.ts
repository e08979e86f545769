import type { Bench } from '../../shared-core/bench/bench.ts';
import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import { createRandom, type Random } from '../../shared-core/numeric/random.ts';
import { hydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import { hBetaStarkRelativeSigma, starkWidthRelativeToHBeta } from '../../shared-core/physics/stark.ts';
import { defaultAnalysisOptions, diagnose } from '../../shared-core/pipeline/diagnose.ts';
import type { ResponseTable } from '../../shared-core/recording/recording.ts';
import { simulateRecording } from '../../shared-core/simulation/simulate-recording.ts';
import { asRecording, knownBench } from '../support/diagnose-simulated.ts';
import type { CoverageCase } from './coverage-cases.ts';

/** How one quantity came out over all draws. */
export interface Tally {
  readonly measured: number;
  /** Draws whose interval holds the truth. */
  readonly covered: number;
  /** Of (found - truth) / sigma. */
  readonly meanPull: number;
  readonly rmsPull: number;
  /** Of found - truth: K, and of the logarithm of the density. */
  readonly rms: number;
}

export interface CoverageResult {
  readonly drawCount: number;
  readonly temperature: Tally;
  readonly density: Tally;
  readonly verdicts: ReadonlyMap<string, number>;
}

/**
 * Draws and diagnoses. Everything that the program believes with an uncertainty is drawn from that belief: noise, axis,
 * instrument width, the Stark laws, and where stated the response.
 */
export function runCoverageCase(
  each: CoverageCase,
  drawCount: number,
  change: NonNullable<Bench['analysis']> = {},
): CoverageResult {
  const temperature = tally();
  const density = tally();
  const verdicts = new Map<string, number>();
  for (let index = 0; index < drawCount; index++) {
    const found = diagnoseDraw(each, 500_000 + index, change);
    verdicts.set(found.verdict, (verdicts.get(found.verdict) ?? 0) + 1);
    const { kelvin, sigmaKelvin, lowKelvin, highKelvin } = found.temperature;
    if (kelvin !== null)
      temperature.add(
        kelvin - each.kelvin,
        sigmaKelvin!,
        lowKelvin! <= each.kelvin && each.kelvin <= highKelvin!,
      );
    const { perCubicMetre, lowPerCubicMetre: low, highPerCubicMetre: high } = found.electronDensity;
    const truth = each.electronsPerCubicMetre;
    if (perCubicMetre !== null)
      density.add(
        Math.log(perCubicMetre / truth),
        Math.log(high! / low!) / 2 / 1.959964,
        low! <= truth && truth <= high!,
      );
  }
  return { drawCount, temperature: temperature.result(), density: density.result(), verdicts };
}

export function diagnoseDraw(
  each: CoverageCase,
  seed: number,
  change: NonNullable<Bench['analysis']>,
): Diagnosis {
  const { input, response, bench, kelvin, electronsPerCubicMetre } = each;
  const random = createRandom(seed);
  const [first, last] = input.rangeNm;
  const phaseNm = 0.09 * random.uniform();
  const offsetNm = 0.02 * random.normal();
  const setting = input.bench ?? knownBench;
  const { fwhmNm, fwhmSigmaNm } = knownBench.instrument!;
  const { wavelengthNm, signal } = simulateRecording({
    kelvin,
    electronsPerCubicMetre,
    starkFactorOf: drawStarkFactors(random),
    ...input,
    bench: { ...setting, instrument: { fwhmNm: fwhmNm! + fwhmSigmaNm! * random.normal() } },
    seed: seed + 1_000_000,
    rangeNm: [first + phaseNm, last + phaseNm],
    recordedNm: (nm) => nm + offsetNm,
    ...(response === undefined ? {} : { responseAt: drawResponse(random, response) }),
  });
  const known = bench ?? setting;
  const result = diagnose({
    recording: asRecording(wavelengthNm, signal),
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
  return result.value.diagnosis;
}

function tally() {
  const errors: number[] = [];
  const pulls: number[] = [];
  let covered = 0;
  const mean = (values: readonly number[]): number =>
    values.reduce((sum, value) => sum + value, 0) / values.length;
  const rms = (values: readonly number[]): number => Math.sqrt(mean(values.map((value) => value * value)));
  return {
    add(error: number, sigma: number, isCovered: boolean): void {
      errors.push(error);
      pulls.push(error / sigma);
      if (isCovered) covered++;
    },
    result: (): Tally => ({
      measured: errors.length,
      covered,
      meanPull: mean(pulls),
      rmsPull: rms(pulls),
      rms: rms(errors),
    }),
  };
}

/** One error for all lines and one for each, as uncertain as the laws say. */
function drawStarkFactors(random: Random): (upperLevel: number) => number {
  const common = Math.exp(hBetaStarkRelativeSigma * random.normal());
  const factors = Array.from({ length: 13 }, (_, level) =>
    level < 3 ? 1 : Math.max(0.1, 1 + starkWidthRelativeToHBeta(level).relativeSigma * random.normal()),
  );
  return (upperLevel) => common * factors[upperLevel]!;
}

/** ln(response) at the lines: a chain in wavelength with exactly the covariance u^2 exp(-d/L), joined by straight lines. */
function drawResponse(
  random: Random,
  { relativeSigma, correlationLengthNm }: NonNullable<CoverageCase['response']>,
): (nm: number) => number {
  const nodes: { nm: number; ln: number }[] = [];
  for (let level = 12; level >= 3; level--) {
    const nm = hydrogenLine(level).wavelengthAirNm;
    const before = nodes.at(-1);
    const keep = before === undefined ? 0 : Math.exp(-(nm - before.nm) / correlationLengthNm);
    const ln = keep * (before?.ln ?? 0) + relativeSigma * Math.sqrt(1 - keep * keep) * random.normal();
    nodes.push({ nm, ln });
  }
  return (nm) => {
    const after = nodes.findIndex((node) => node.nm >= nm);
    if (after <= 0) return Math.exp(nodes.at(after)!.ln);
    const [a, b] = [nodes[after - 1]!, nodes[after]!];
    return Math.exp(a.ln + ((b.ln - a.ln) * (nm - a.nm)) / (b.nm - a.nm));
  };
}

const flatTable = (relativeSigma: number): ResponseTable => ({
  name: 'response.csv',
  sha256: '',
  wavelengthNm: Float64Array.from([300, 800]),
  response: Float64Array.from([1, 1]),
  relativeSigma: Float64Array.from([relativeSigma, relativeSigma]),
});
