import { halfHeightWidthNm, type Peak } from '../axis/find-peaks.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { noAdditions, possibleAdditions, type Additions } from './additions.ts';
import { carryValues } from './carry-values.ts';
import { pixelAt } from '../axis/pixel-at.ts';
import { chooseWindows, reachingLines, type ExpectedWidths, type WindowPlan } from './choose-windows.ts';
import { findCoreDeficit } from './core-deficit.ts';
import { describeFits } from './describe-fits.ts';
import { logLikelihoodDeviance } from './deviance.ts';
import { createJointModel } from './joint-model.ts';
import { fixedAt, starkIndex, type JointLine, type JointProblem } from './joint-problem.ts';
import { hydrogenLine } from '../physics/hydrogen.ts';
import type { LineFits } from './line-fit.ts';
import { measureNoise } from './measure-noise.ts';
import { findMissingLight, withoutMissingLight, type MissingLight } from './missing-light.ts';
import { placeLine, poseProblem, toJointLine, type Sharing } from './pose-problem.ts';
import { noiseMemory } from '../noise/noise-memory.ts';
import { nextAdditions } from './score-additions.ts';
import { solveJoint } from './solve-joint.ts';
import type { PlannedFit } from './planned-fit.ts';
import type { FitLinesInput, SolvedFit } from './solved-fit.ts';

/** Deviance the freer model must gain: beyond any chance, and three a line for its added parameters. */
const rejectionDeviance = 15;
/** What a pixel adds to the squared FWHM seen, in squared pixel widths: 8 ln 2 / 12. */
const pixelSpread = 0.4621;
/** First guess of the noise that grows with the light, where no gain is known: 5 % of the light of a pixel. */
const guessedMisfit = 0.05;
/** Rounds of asking what else is there; each takes the plainest finding in every segment. */
const additionRounds = 5;
/** Upper levels of the Balmer lines that may reach into the windows of those that are analysed. */
const seriesMembers = [3, 4, 5, 6, 7, 8, 9, 10, 11, 12];

/**
 * Fits all lines of a registered recording together.
 *
 * First the shared model: one instrument width, one Stark width law, one axis. Light that it does not hold but that
 * belongs to known neighbours (deuterium, lines and bands of other gases, a curved background) is looked for and
 * fitted along where the data show it. Lines in absorption and self-reversed lines are put aside, and never fitted as
 * emission. Where the model still does not describe the data, two explanations are tried. A
 * bright line whose core lies below what its flanks demand (soft clipping, self-absorption) is taken out if the others
 * then agree among themselves. Otherwise, when the data reject the shared model in favour of lines with their own
 * widths and places (deviance gain above 15 + 3 a line), the freer model is used, and the result says so. The bench may
 * ask for the freer model from the start. Without a
 * gain the noise that grows with the light is measured on the residuals.
 *
 * @check test/property/joint-fit.test.ts
 */
export function fitLines(input: FitLinesInput): LineFits {
  const widths = startWidths(input);
  const wanted = input.lines.map((line) => toJointLine(input, line));
  const others = seriesMembers
    .map((level) => hydrogenLine(level))
    .filter(({ id }) => input.lines.every((line) => line.id !== id))
    .map((line) => ({ ...placeLine(input, line), line }));
  const reaching = new Set(reachingLines(wanted, others, widths).map(({ id }) => id));
  const candidates = [
    ...wanted,
    ...others.filter(({ id }) => reaching.has(id)).map(({ line }) => toJointLine(input, line)),
  ];
  const matchedNm = new Set(input.registration.matched.map(({ peak }) => peak.recordedNm));
  const foreign = input.search.peaks.filter((peak) => !matchedNm.has(peak.recordedNm));
  return fitCandidates(input, candidates, foreign, widths, new Map());
}

/** Fits what is left when lines that take light out instead of adding it are put aside; those found on the way join them. */
function fitCandidates(
  input: FitLinesInput,
  candidates: readonly JointLine[],
  foreign: readonly Peak[],
  widths: ExpectedWidths,
  missing: ReadonlyMap<string, MissingLight>,
): LineFits {
  const planFor = (lines: readonly JointLine[]): WindowPlan =>
    withoutMissingLight(
      chooseWindows(input.recording, lines, foreign, widths),
      input.recording.wavelengthNm,
      missing,
    );
  const plan = planFor(candidates);
  if (plan.lines.length === 0) return describeFits(input, plan, null);

  const isByLine = input.bench.analysis?.fit === 'line-by-line';
  const first = fitPlan(input, plan, widths, isByLine ? 'own' : 'shared');
  const found = findMissingLight(first.fit, plan.lines.length);
  if (found.size > 0) {
    const others = candidates.filter(({ id }) => !found.has(id));
    return fitCandidates(input, others, foreign, widths, new Map([...missing, ...found]));
  }
  if (isByLine || isGood(first.fit)) return describeFits(input, plan, first);
  const deficit = findCoreDeficit(first.fit, plan.lines.length, solve);
  if (deficit !== null) {
    const reduced = planFor(candidates.filter(({ id }) => id !== deficit.lineId));
    const without = reduced.lines.length === 0 ? null : fitPlan(input, reduced, widths, 'shared');
    if (without !== null && isGood(without.fit)) {
      const obstacles = new Map([...reduced.obstacles, [deficit.lineId, deficit.obstacle] as const]);
      return describeFits(input, { ...reduced, obstacles }, without);
    }
  }
  return describeFits(input, plan, freerIfBetter(input, plan, widths, first));
}

/** Fits the Balmer lines alone, asks the data what else lies under them, and fits again with that. */
function fitPlan(
  input: FitLinesInput,
  plan: WindowPlan,
  widths: ExpectedWidths,
  sharing: Sharing,
): PlannedFit {
  let additions: Additions = { ...noAdditions, deuterium: input.bench.analysis?.deuterium === 'present' };
  let fit = solveWithNoise(poseProblem(input, plan, widths, sharing, additions));
  if (fit.solution.status !== 'converged') return { fit, additions };
  const possible = possibleAdditions(input, plan);
  const posed = (wanted: Additions): JointProblem => {
    const problem = poseProblem(input, plan, widths, sharing, wanted);
    return {
      ...problem,
      variancePerSignal: fit.problem.variancePerSignal,
      relativeMisfit: fit.problem.relativeMisfit,
      expected: fit.model,
      start: carryValues(fit.problem, problem, fit.solution.values),
    };
  };
  for (let round = 0; round < additionRounds; round++) {
    const next = nextAdditions(fit, additions, possible);
    const isMore = countOf(next) > countOf(additions);
    const wider = isMore ? solveWithNoise(posed(next)) : fit;
    if (wider.solution.status !== 'converged') break;
    additions = next;
    fit = wider;
    if (!isMore) break;
  }
  return { fit, additions };
}

const countOf = ({ deuterium, companions, curvedSegments }: Additions): number =>
  (deuterium ? 1 : 0) + companions.length + curvedSegments.size;

/** Describes the data to within their noise; where the noise was measured on the residuals, near enough. */
function isGood({ problem, solution }: SolvedFit): boolean {
  const { chiSquare, degreesOfFreedom, status } = solution;
  const { noise } = problem.recording;
  const spread = Math.sqrt(2 * degreesOfFreedom * noiseMemory(noise.correlation).varianceOfChiSquare);
  const limit =
    noise.gainElectronsPerCount === null ? 1.5 * degreesOfFreedom : degreesOfFreedom + 3.3 * spread;
  return status === 'converged' && chiSquare < limit;
}

function freerIfBetter(
  input: FitLinesInput,
  plan: WindowPlan,
  widths: ExpectedWidths,
  shared: PlannedFit,
): PlannedFit {
  const isShared = shared.fit.solution.status === 'converged';
  if (plan.lines.length < 2 && isShared) return shared;
  const own = fitPlan(input, plan, widths, 'own');
  if (own.fit.solution.status !== 'converged') return shared;
  if (!isShared) return own;
  const gain =
    logLikelihoodDeviance(shared.fit.problem, shared.fit.model) -
    logLikelihoodDeviance(own.fit.problem, own.fit.model);
  // Noise shared by neighbours looks like structure that a freer model can follow.
  const { varianceOfMean } = noiseMemory(input.recording.noise.correlation);
  return gain > varianceOfMean * (rejectionDeviance + 3 * plan.lines.length) ? own : shared;
}

/** Instrument width from the bench or the narrowest strong line; Stark width from what H-beta shows beyond it. */
function startWidths({ recording, registration, search, bench }: FitLinesInput): ExpectedWidths {
  const stated = bench.instrument?.fwhmNm;
  let narrowest = Infinity;
  let beta: number | null = null;
  for (const { id, peak } of registration.matched) {
    if (peak.hasClipping || peak.signalToNoise <= 15) continue;
    if (stated !== undefined && id !== 'H-beta') continue;
    const fwhmNm = halfHeightWidthNm(recording, highestNear(recording, peak.recordedNm));
    narrowest = Math.min(narrowest, fwhmNm);
    if (id === 'H-beta') beta = fwhmNm;
  }
  const pixelNm = recording.edgeNm[1]! - recording.edgeNm[0]!;
  const pixelSquared = pixelSpread * pixelNm * pixelNm;
  const measuredNm = Number.isFinite(narrowest) ? narrowest : search.fwhmNm;
  const instrumentNm =
    stated ?? Math.sqrt(Math.max(measuredNm * measuredNm - pixelSquared, 0.25 * measuredNm * measuredNm));
  const smoothedNm = recording.noise.runningMeanPoints * pixelNm;
  const unbroadened =
    recording.noise.runningMeanPoints > 1
      ? smoothedFwhmSquaredNm2(instrumentNm, smoothedNm)
      : instrumentNm * instrumentNm + pixelSquared;
  const excess = beta === null ? 0 : beta - unbroadened / beta;
  return { instrumentNm, starkNm: excess > 0.3 * instrumentNm ? excess : 0 };
}

/**
 * Squared FWHM of a Gauss line after a running mean, nm^2: exact for lines much wider and much narrower than the mean, at
 * most 14 % above the truth between (own quadrature).
 */
function smoothedFwhmSquaredNm2(fwhmNm: number, meanNm: number): number {
  const line = fwhmNm * fwhmNm;
  const mean = meanNm * meanNm;
  return Math.sqrt(line * line + 2 * pixelSpread * line * mean + mean * mean);
}

function highestNear({ wavelengthNm, netSignal }: CorrectedRecording, nm: number): number {
  let top = pixelAt(wavelengthNm, nm);
  const from = Math.max(1, top - 2);
  const to = Math.min(netSignal.length - 2, top + 2);
  for (let px = from; px <= to; px++) if (netSignal[px]! > netSignal[top]!) top = px;
  return top;
}

/** Solves, and where the gain is not known measures the noise on the residuals and solves again, twice. */
function solveWithNoise(problem: JointProblem): SolvedFit {
  if (problem.recording.noise.gainElectronsPerCount !== null) return solve(problem);
  const isMeasured = problem.expected !== null;
  let fit = solve(isMeasured ? problem : { ...problem, relativeMisfit: guessedMisfit });
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
    start: new Map([...problem.start, [starkIndex, 0]]),
  };
  const again = createJointModel(narrow);
  return { problem: narrow, model: again, solution: solveJoint(again, weights) };
}
