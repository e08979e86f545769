import { toRecordedNm } from '../axis/axis-polynomial.ts';
import { halfHeightWidthNm } from '../axis/find-peaks.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import type { HydrogenLine } from '../physics/hydrogen.ts';
import { lorentzianBeforehandNm, thermalFwhmSquaredNm2 } from '../physics/line-widths.ts';
import { starkWidthRelativeToHBeta } from '../physics/stark.ts';
import { chooseWindows, pixelAt, type WindowPlan } from './choose-windows.ts';
import { findCoreDeficit } from './core-deficit.ts';
import { describeFits } from './describe-fits.ts';
import { createJointModel } from './joint-model.ts';
import {
  fixedAt,
  free,
  starkIndex,
  type Belief,
  type JointLine,
  type JointProblem,
} from './joint-problem.ts';
import type { LineFits } from './line-fit.ts';
import { measureNoise } from './measure-noise.ts';
import { logLikelihoodDeviance } from './deviance.ts';
import { solveJoint } from './solve-joint.ts';
import type { FitLinesInput, SolvedFit } from './solved-fit.ts';

/** How far a single line may depart from the shared laws, 1 sigma. */
const departures = Object.freeze({
  /** Share of the instrument width by which a line may lie off the straight axis when the bench states no axis sigma. */
  centreShare: 0.15,
  ownCentreShare: 0.5,
  ownWidth: 0.4,
  ownStark: 0.5,
});
/** Deviance the freer model must gain: beyond any chance, and three a line for its added parameters. */
const rejectionDeviance = 15;
/** A bench that states a width but no uncertainty for it is trusted to 3 %. */
const assumedWidthUncertainty = 0.03;
/** A width read off the recording's narrowest line holds whatever broadens that line: it only roughly bounds the instrument's. */
const unknownWidthUncertainty = 0.3;
/** What a pixel adds to the squared FWHM seen, in squared pixel widths: 8 ln 2 / 12. */
const pixelSpread = 0.4621;
/** First guess of the noise that grows with the light, where no gain is known: 5 % of the light of a pixel. */
const guessedMisfit = 0.05;

/**
 * Fits all lines of a registered recording together.
 *
 * First the shared model: one instrument width, one Stark width law, one axis. Where it does not describe the data,
 * two explanations are tried. A bright line whose core lies below what its flanks demand (soft clipping,
 * self-absorption) is taken out if the others then agree among themselves. Otherwise, when the data reject the shared
 * model in favour of lines with their own widths and places (deviance gain above 15 + 3 a line), the freer model is
 * used, and the result says so. Without a gain the noise that grows with the light is measured on the residuals.
 *
 * @check test/property/joint-fit.test.ts
 */
export function fitLines(input: FitLinesInput): LineFits {
  const widths = startWidths(input);
  const candidates = input.lines.map((line) => toJointLine(input, line));
  const matchedNm = new Set(input.registration.matched.map(({ peak }) => peak.recordedNm));
  const foreign = input.search.peaks.filter((peak) => !matchedNm.has(peak.recordedNm));
  const plan = chooseWindows(input.recording, candidates, foreign, widths);
  if (plan.lines.length === 0) return describeFits(input, plan, null);

  const shared = fitShared(input, plan, widths);
  if (isGood(shared)) return describeFits(input, plan, shared);
  const deficit = findCoreDeficit(shared, solve);
  if (deficit !== null) {
    const others = candidates.filter(({ id }) => id !== deficit.lineId);
    const reduced = chooseWindows(input.recording, others, foreign, widths);
    const without = reduced.lines.length === 0 ? null : fitShared(input, reduced, widths);
    if (without !== null && isGood(without)) {
      const obstacles = new Map([...reduced.obstacles, [deficit.lineId, deficit.obstacle] as const]);
      return describeFits(input, { ...reduced, obstacles }, without);
    }
  }
  return describeFits(input, plan, freerIfBetter(input, plan, widths, shared));
}

function fitShared(input: FitLinesInput, plan: WindowPlan, widths: StartWidths): SolvedFit {
  return solveWithNoise(poseProblem(input, plan, widths, 'shared', input.recording.noise.variancePerSignal));
}

/** Describes the data to within their noise; where the noise was measured on the residuals, near enough. */
function isGood({ problem, solution }: SolvedFit): boolean {
  const { chiSquare, degreesOfFreedom, status } = solution;
  const limit =
    problem.recording.noise.gainElectronsPerCount === null
      ? 1.5 * degreesOfFreedom
      : degreesOfFreedom + 3.3 * Math.sqrt(2 * degreesOfFreedom);
  return status === 'converged' && chiSquare < limit;
}

function freerIfBetter(
  input: FitLinesInput,
  plan: WindowPlan,
  widths: StartWidths,
  shared: SolvedFit,
): SolvedFit {
  if (plan.lines.length < 2 && shared.solution.status === 'converged') return shared;
  const own = solveWithNoise(
    poseProblem(input, plan, widths, 'own', input.recording.noise.variancePerSignal),
  );
  if (own.solution.status !== 'converged') return shared;
  if (shared.solution.status !== 'converged') return own;
  const gain =
    logLikelihoodDeviance(shared.problem, shared.model) - logLikelihoodDeviance(own.problem, own.model);
  return gain > rejectionDeviance + 3 * plan.lines.length ? own : shared;
}

interface StartWidths {
  readonly instrumentNm: number;
  readonly starkNm: number;
}

/** Instrument width from the bench or the narrowest strong line; Stark width from what H-beta shows beyond it. */
function startWidths({ recording, registration, search, bench }: FitLinesInput): StartWidths {
  const measured = registration.matched
    .filter(({ peak }) => !peak.hasClipping && peak.signalToNoise > 15)
    .map(({ id, peak }) => ({
      id,
      fwhmNm: halfHeightWidthNm(recording, highestNear(recording, peak.recordedNm)),
    }));
  const narrowest = measured.reduce((least, { fwhmNm }) => Math.min(least, fwhmNm), Infinity);
  const pixelNm = recording.edgeNm[1]! - recording.edgeNm[0]!;
  const pixelSquared = pixelSpread * pixelNm * pixelNm;
  const measuredNm = Number.isFinite(narrowest) ? narrowest : search.fwhmNm;
  const instrumentNm =
    bench.instrument?.fwhmNm ??
    Math.sqrt(Math.max(measuredNm * measuredNm - pixelSquared, 0.25 * measuredNm * measuredNm));
  const beta = measured.find(({ id }) => id === 'H-beta');
  const excess =
    beta === undefined ? 0 : beta.fwhmNm - (instrumentNm * instrumentNm + pixelSquared) / beta.fwhmNm;
  return { instrumentNm, starkNm: excess > 0.3 * instrumentNm ? excess : 0 };
}

function highestNear({ wavelengthNm, netSignal }: CorrectedRecording, nm: number): number {
  let top = pixelAt(wavelengthNm, nm);
  const from = Math.max(1, top - 2);
  const to = Math.min(netSignal.length - 2, top + 2);
  for (let px = from; px <= to; px++) if (netSignal[px]! > netSignal[top]!) top = px;
  return top;
}

function toJointLine({ recording, registration, bench }: FitLinesInput, line: HydrogenLine): JointLine {
  const referenceNm = recording.medium === 'air' ? line.wavelengthAirNm : line.wavelengthVacuumNm;
  return {
    id: line.id,
    upperLevel: line.upperLevel,
    referenceNm,
    nominalCentreNm: toRecordedNm(registration.map, referenceNm),
    extraFwhmSquaredNm2: thermalFwhmSquaredNm2(line, bench.lamp ?? {}),
    starkRatio: starkWidthRelativeToHBeta(line.upperLevel).ratio,
    fixedLorentzianFwhmNm: lorentzianBeforehandNm(line, bench.lamp ?? {}),
  };
}

/** Solves, and where the gain is not known measures the noise on the residuals and solves again, twice. */
function solveWithNoise(problem: JointProblem): SolvedFit {
  if (problem.recording.noise.gainElectronsPerCount !== null) return solve(problem);
  let fit = solve({ ...problem, relativeMisfit: guessedMisfit });
  for (let round = 0; round < 2; round++) {
    const next = solve({ ...problem, ...measureNoise(fit), expected: fit.model });
    if (next.solution.status !== 'converged') break;
    fit = next;
  }
  return fit;
}

function solve(problem: JointProblem): SolvedFit {
  const model = createJointModel(problem);
  const weights = problem.recording.noise.gainElectronsPerCount === null ? 'held' : 'from-model';
  const solution = solveJoint(model, weights);
  if (solution.status === 'converged' || problem.beliefs.starkFwhmNm.sigma === 0)
    return { problem, model, solution };
  // A line narrower than its instrument has no Stark width to find: the fit is repeated without one.
  if (solution.values[starkIndex]! > 0) return { problem, model, solution };
  const narrow: JointProblem = {
    ...problem,
    beliefs: { ...problem.beliefs, starkFwhmNm: fixedAt(0) },
    start: { ...problem.start, starkFwhmNm: 0 },
  };
  const again = createJointModel(narrow);
  return { problem: narrow, model: again, solution: solveJoint(again, weights) };
}

function poseProblem(
  { recording, registration, bench }: FitLinesInput,
  plan: WindowPlan,
  widths: StartWidths,
  sharing: 'shared' | 'own',
  variancePerSignal: number,
): JointProblem {
  const known = bench.instrument?.fwhmNm;
  const instrumentFwhmNm: Belief =
    known === undefined
      ? { mean: widths.instrumentNm, sigma: unknownWidthUncertainty * widths.instrumentNm }
      : { mean: known, sigma: bench.instrument?.fwhmSigmaNm ?? assumedWidthUncertainty * known };
  const centreSigma =
    sharing === 'own'
      ? departures.ownCentreShare * widths.instrumentNm
      : (bench.axis?.sigmaNm ?? departures.centreShare * widths.instrumentNm);
  return {
    recording,
    masked: plan.masked,
    lines: plan.lines,
    segments: plan.segments,
    pivotNm: registration.map.pivotNm,
    variancePerSignal,
    relativeMisfit: 0,
    beliefs: {
      offsetNm: { mean: 0, sigma: widths.instrumentNm },
      stretch: plan.lines.length < 2 ? fixedAt(0) : { mean: 0, sigma: 0.002 },
      instrumentFwhmNm,
      starkFwhmNm: free,
      centreDepartureNm: { mean: 0, sigma: centreSigma },
      starkDeparture: plan.lines.map(({ upperLevel }) =>
        sharing === 'own'
          ? { mean: 0, sigma: departures.ownStark }
          : { mean: 0, sigma: starkWidthRelativeToHBeta(upperLevel).relativeSigma },
      ),
      widthDeparture: sharing === 'own' ? { mean: 0, sigma: departures.ownWidth } : fixedAt(0),
    },
    expected: null,
    start: { instrumentFwhmNm: widths.instrumentNm, starkFwhmNm: widths.starkNm },
  };
}
