import { toRegisteredNm } from '../axis/axis-polynomial.ts';
import { balmerLines } from './balmer-lines.ts';
import { budget, effectiveFreedom } from './budget.ts';
import { absorptionCheck } from './checks/absorption-check.ts';
import { branchingCheck } from './checks/branching-check.ts';
import { opticalDepthCheck } from './checks/optical-depth-check.ts';
import { partialEquilibriumCheck, sahaCheck } from './checks/equilibrium-checks.ts';
import { selfAbsorptionCheck } from './checks/self-absorption-check.ts';
import { axisCheck, shiftNm } from './checks/axis-check.ts';
import { blendCheck, profileCheck, significanceCheck } from './checks/line-checks.ts';
import { densityCheck, influenceCheck, spanCheck, straightnessCheck } from './checks/population-checks.ts';
import { clippingCheck, noiseCheck, samplingCheck } from './checks/recording-checks.ts';
import { responseCheck } from './checks/response-check.ts';
import type { Check, DiagnosedLine, Diagnosis } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';
import { equilibrium } from './equilibrium.ts';
import { companionSection, deuteriumSection, gasTemperatureSection } from './gas.ts';
import { identificationSections } from './identification.ts';
import { instrumentProfileSection } from './instrument-profile.ts';
import { lineRatioSection } from './line-ratio-section.ts';
import { selfAbsorptionSection } from './self-absorption.ts';
import { meaning } from './meaning.ts';
import { coversNm, responseAt } from '../populations/response-at.ts';
import { monteCarloRemark, monteCarloSection, standingInterval } from './monte-carlo-section.ts';
import { opticalDepthSection } from './optical-depths.ts';
import { plain } from './plain-number.ts';
import { reasonsOff } from './reasons.ts';
import { finalAxisMap, registeredAxis } from './registered-axis.ts';
import { verdict, worstFirst } from './verdict.ts';

/**
 * All checks, in the order of the argument. A new check is one function and one row here; null where there is nothing to
 * judge.
 */
const allChecks: readonly ((evidence: Evidence) => Check | null)[] = [
  axisCheck,
  clippingCheck,
  samplingCheck,
  noiseCheck,
  significanceCheck,
  profileCheck,
  blendCheck,
  absorptionCheck,
  responseCheck,
  branchingCheck,
  spanCheck,
  straightnessCheck,
  influenceCheck,
  selfAbsorptionCheck,
  opticalDepthCheck,
  densityCheck,
  partialEquilibriumCheck,
  sahaCheck,
];

interface NamedFile {
  readonly name: string;
  readonly sha256: string;
}

export interface AssembleInput {
  readonly evidence: Evidence;
  readonly programVersion: string;
  readonly recordingMedium: 'air' | 'vacuum';
  readonly dark: NamedFile | null;
  readonly profile: NamedFile | null;
  readonly mirror: NamedFile | null;
  readonly source: NamedFile | null;
  readonly through: NamedFile | null;
  readonly upperLevels: readonly number[];
  readonly coverage: number;
  readonly notes: readonly string[];
}

/** Puts what the stages found into the diagnosis format. */
export function assembleDiagnosis(input: AssembleInput): Diagnosis {
  const { evidence, coverage } = input;
  const { recording, bench, response, registration, fits, temperature, density } = evidence;
  const checks = worstFirst(allChecks.map((check) => check(evidence)).filter((check) => check !== null));
  const overall = verdict(evidence, checks);
  const n = recording.wavelengthNm.length;
  const isRegistered = registration.status === 'registered';
  const axis = registeredAxis(registration, fits);
  return {
    schema: 'lampwright.diagnosis/1',
    program: { name: 'lampwright', version: input.programVersion },
    recording: {
      name: recording.name,
      sha256: recording.sha256,
      pointCount: n,
      firstNm: recording.wavelengthNm[0]!,
      lastNm: recording.wavelengthNm[n - 1]!,
      medium: input.recordingMedium,
    },
    inputs: {
      bench: bench.name ?? null,
      dark: input.dark,
      response:
        response === null
          ? null
          : { name: response.name, sha256: response.sha256, per: bench.response?.per ?? 'photon' },
      profile: input.profile,
      mirror: input.mirror,
      source: input.source,
      through: input.through,
    },
    options: {
      upperLevels: [...input.upperLevels],
      leftOut: [...evidence.leftOut],
      coverage,
      deuterium: bench.analysis?.deuterium ?? 'auto',
      ...evidence.choices,
    },
    axis: {
      status: registration.status,
      offsetNm: isRegistered ? axis.offsetNm : null,
      offsetSigmaNm: isRegistered ? axis.offsetSigmaNm : null,
      stretch: isRegistered ? axis.stretch : null,
      stretchSigma: isRegistered ? axis.stretchSigma : null,
      pivotNm: registration.map.pivotNm,
      matchedLines: registration.matched.map(({ id }) => id),
      text: axisText(evidence),
    },
    lines: describeLines(input),
    temperature: {
      status: temperature.status,
      kelvin: temperature.kelvin,
      sigmaKelvin: temperature.sigmaKelvin,
      ...standingEnds(evidence),
      coverage,
      chiSquare: temperature.boltzmann?.line.chiSquare ?? null,
      degreesOfFreedom: temperature.boltzmann?.line.degreesOfFreedom ?? null,
      effectiveDegreesOfFreedom: effectiveFreedom(evidence),
      birgeRatio: temperature.birgeRatio,
      widening: temperature.widening,
      responseCorrected: response !== null || bench.detector?.signal === 'energy',
      text: temperatureText(evidence),
    },
    electronDensity: {
      status: density.status,
      perCubicMetre: density.perCubicMetre,
      lowPerCubicMetre: density.lowPerCubicMetre,
      highPerCubicMetre: density.highPerCubicMetre,
      coverage,
      line: density.line,
      text: density.reason,
    },
    meaning: meaning(evidence),
    instrumentProfile: instrumentProfileSection(evidence, input.profile),
    monteCarlo: monteCarloSection(evidence),
    lineRatios: lineRatioSection(evidence),
    equilibrium: equilibrium(evidence),
    selfAbsorption: selfAbsorptionSection(evidence),
    deuterium: deuteriumSection(evidence),
    gasTemperature: gasTemperatureSection(evidence),
    companions: companionSection(evidence),
    opticalDepths: opticalDepthSection(evidence),
    ...identificationSections(evidence),
    checks,
    budget: budget(evidence),
    verdict: overall.verdict,
    verdictText: overall.text,
    notes: [...input.notes],
  };
}

function standingEnds(evidence: Evidence): { lowKelvin: number | null; highKelvin: number | null } {
  const { lowKelvin, highKelvin } = standingInterval(evidence);
  return { lowKelvin, highKelvin };
}

function axisText(evidence: Evidence): string {
  if (evidence.registration.status !== 'registered') return 'The wavelength axis could not be registered.';
  return `Recorded minus true at H-beta: ${plain(shiftNm(evidence), 3)} nm.`;
}

function temperatureText(evidence: Evidence): string {
  const { temperature, response, bench } = evidence;
  if (temperature.status === 'not-determined') return `Not determined: ${temperature.reason}.`;
  const isCorrected = response !== null || bench.detector?.signal === 'energy';
  const remarks = [
    evidence.belowEquilibrium.length > 0 ? ' From levels in equilibrium with the electrons only.' : '',
    evidence.isSelfAbsorptionApplied ? ' Corrected for self-absorption of H-alpha.' : '',
    temperature.widening > 1
      ? ` Interval widened by the Birge ratio ${plain(temperature.widening, 3)} of the scatter.`
      : '',
    monteCarloRemark(evidence),
    isCorrected ? '' : ' Uncorrected for the spectral response.',
  ].join('');
  if (temperature.status === 'lower-limit') {
    return `Lower limit ${plain(temperature.lowKelvin!, 3)} K: ${temperature.reason}.${remarks}`;
  }
  return `Excitation temperature of the used levels.${remarks}`;
}

function describeLines({ evidence, upperLevels }: AssembleInput): DiagnosedLine[] {
  const { recording, registration, fits, temperature } = evidence;
  const areaScale = recording.noise.gainElectronsPerCount ?? 1;
  const areaUnit =
    recording.signalKind === 'per-nm'
      ? 'signal nm'
      : recording.noise.gainElectronsPerCount === null
        ? 'counts'
        : 'electrons';
  const used = new Set(temperature.used.map((index) => fits.fits[index]!.id));
  const responses = relativeResponses(evidence);
  const axisMap = finalAxisMap(registration, fits);
  const otherSeries = evidence.fittedLines.filter(({ lowerLevel }) => lowerLevel !== 2);
  return [...balmerLines(upperLevels), ...otherSeries].map((line): DiagnosedLine => {
    const fit = fits.fits.find(({ id }) => id === line.id) ?? null;
    const isUsed = used.has(line.id) && temperature.boltzmann !== null;
    return {
      id: line.id,
      upperLevel: line.upperLevel,
      lowerLevel: line.lowerLevel,
      referenceNm: recording.medium === 'air' ? line.wavelengthAirNm : line.wavelengthVacuumNm,
      recordedNm: fit && fit.recordedCentreNm,
      centreNm: fit && toRegisteredNm(axisMap, fit.recordedCentreNm),
      centreSigmaNm: fit && fit.centreSigmaNm,
      area: fit && fit.area * areaScale,
      areaSigma: fit && fit.areaSigma * areaScale,
      areaUnit,
      signalToNoise: fit && fit.area / fit.areaSigma,
      gaussianFwhmNm: fit && fit.gaussianFwhmNm,
      lorentzianFwhmNm: fit && Math.max(0, fit.lorentzianFwhmNm),
      lorentzianFwhmSigmaNm: fit && fit.lorentzianFwhmSigmaNm,
      response: fit && (responses.get(line.id) ?? null),
      reducedChiSquare: fit && fit.reducedChiSquare,
      fitStatus: fit?.status ?? 'not-fitted',
      used: isUsed,
      reasons: isUsed ? [] : reasonsOff(evidence, line.id),
    };
  });
}

/** Response at each covered line relative to the strongest used one. */
function relativeResponses({ response, fits, temperature }: Evidence): ReadonlyMap<string, number> {
  if (response === null) return new Map();
  const covered = fits.fits.filter(({ referenceNm }) => coversNm(response, referenceNm));
  const values = responseAt(
    response,
    covered.map(({ referenceNm }) => referenceNm),
  ).response;
  const reference = temperature.used[0] === undefined ? undefined : fits.fits[temperature.used[0]]!.id;
  const at = Math.max(
    0,
    covered.findIndex(({ id }) => id === reference),
  );
  return new Map(covered.map(({ id }, index) => [id, values[index]! / values[at]!]));
}
