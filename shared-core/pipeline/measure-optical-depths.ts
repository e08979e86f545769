import { toRecordedNm } from '../axis/axis-polynomial.ts';
import type { PeakSearch } from '../axis/find-peaks.ts';
import type { AxisRegistration } from '../axis/register-axis.ts';
import type { Bench } from '../bench/bench.ts';
import { finalAxisMap } from '../diagnosis/registered-axis.ts';
import { pixelAt } from '../axis/pixel-at.ts';
import type { LineFits } from '../lines/line-fit.ts';
import { correctRecording } from '../noise/correct-recording.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { exp } from '../numeric/portable-math.ts';
import { voigtFwhmNm } from '../numeric/voigt-pixel.ts';
import type { AbsorbingAtoms } from '../optical-depth/absorbing-profile.ts';
import { measureByAbsorption } from '../optical-depth/absorption.ts';
import { alignRecording } from '../optical-depth/align-recording.ts';
import { notDetermined } from '../optical-depth/describe-depth.ts';
import type { OpticalDepthFinding } from '../optical-depth/finding.ts';
import { measureWithMirror } from '../optical-depth/mirror.ts';
import {
  observeLine,
  type GasShapes,
  type LinePlace,
  type ObservedLine,
} from '../optical-depth/observed-line.ts';
import { hydrogenLine, seriesLine, type HydrogenLine } from '../physics/hydrogen.ts';
import { defaultGasTemperatureK } from '../physics/line-widths.ts';
import type { AbsorbingGas } from '../populations/self-absorption.ts';
import type { Recording } from '../recording/recording.ts';
import { ok, type Note, type Result } from '../result/result.ts';

/** Further recordings of the same lamp that measure its optical depth. */
export interface PairRecordings {
  /** With a mirror behind the tube. */
  readonly mirror: Recording | null;
  /** A continuum source behind the tube, the discharge off. */
  readonly source: Recording | null;
  /** The same source, the discharge on. */
  readonly through: Recording | null;
}

export interface OpticalDepthInput extends PairRecordings {
  readonly recording: CorrectedRecording;
  readonly dark: Recording | null;
  readonly bench: Bench;
  readonly search: PeakSearch;
  readonly registration: AxisRegistration;
  readonly fits: LineFits;
  /** The Balmer lines of the analysis. */
  readonly lines: readonly HydrogenLine[];
  readonly gas: AbsorbingGas;
  readonly coverage: number;
}

export interface MeasuredOpticalDepths {
  readonly findings: readonly OpticalDepthFinding[];
  readonly notes: readonly Note[];
}

/** Relative uncertainty of a gas temperature that nobody stated: the range 300 to 3000 K, even on a logarithmic scale. */
const unknownGasLnSigma = 0.66;
const pixelSpread = 0.4621;
/** A peak this close to a line, in widths, is the line. */
const ownWidths = 0.6;
const foreignSignalToNoise = 6;
/** Light of another species under a line that may be passed over. */
const companionShare = 0.02;

const balmerSeries = Array.from({ length: 14 }, (_, index) => hydrogenLine(index + 3));
const paschenSeries = Array.from({ length: 10 }, (_, index) => seriesLine(index + 5, 3));

/** Optical depths from whatever was recorded; a recording that does not fit the main one is refused by name. */
export function measureOpticalDepths(input: OpticalDepthInput): Result<MeasuredOpticalDepths> {
  const { recording, mirror, source, through, fits, coverage } = input;
  const findings: OpticalDepthFinding[] = [];
  const notes: Note[] = [];
  if (input.registration.status !== 'registered') {
    if (mirror !== null || source !== null || through !== null) notes.push(notRegistered);
    return ok({ findings, notes });
  }
  const variancePerSignal = Math.max(recording.noise.variancePerSignal, fits.variancePerSignal);
  if (mirror !== null) {
    const pair = alike(input, mirror, 'mirror recording');
    if (!pair.ok) return pair;
    notes.push(...movedNotes(pair.value));
    findings.push(
      ...measured(input, 'mirror', [pair.value], (lines) =>
        measureWithMirror(lines, recording, pair.value, variancePerSignal, coverage),
      ),
    );
  }
  if (source !== null && through !== null) {
    const alone = alike(input, source, 'source recording');
    if (!alone.ok) return alone;
    const both = alike(input, through, 'recording through the tube');
    if (!both.ok) return both;
    notes.push(...movedNotes(alone.value), ...movedNotes(both.value));
    const recordings = { discharge: recording, source: alone.value, through: both.value };
    findings.push(
      ...measured(input, 'absorption', [alone.value, both.value], (lines) =>
        measureByAbsorption(lines, recordings, variancePerSignal, coverage),
      ),
    );
  } else if (source !== null) notes.push(halfAPair(source, 'recording through the tube'));
  else if (through !== null) notes.push(halfAPair(through, 'recording of the source alone'));
  return ok({ findings, notes });
}

const notRegistered: Note = {
  code: 'pair-unused',
  text: 'No optical depth was measured: the wavelength axis is not registered.',
};

const halfAPair = ({ name }: Recording, missing: string): Note => ({
  code: 'pair-unused',
  text: `"${name}" is not used yet: absorption needs the ${missing} as well.`,
});

const movedNotes = ({ notes }: CorrectedRecording): readonly Note[] =>
  notes.filter(({ code }) => code === 'pair-moved');

/** Dark removed, on the pixels of the main recording. */
function alike(
  { recording, dark, bench }: OpticalDepthInput,
  other: Recording,
  subject: string,
): Result<CorrectedRecording> {
  const usableDark = dark !== null && dark.signal.length === other.signal.length ? dark : null;
  const corrected = correctRecording(other, usableDark, bench);
  return corrected.ok ? alignRecording(recording, corrected.value, subject) : corrected;
}

/** Every line in the order of the analysis: measured where it can be, else with the reason. */
function measured(
  input: OpticalDepthInput,
  method: OpticalDepthFinding['method'],
  others: readonly CorrectedRecording[],
  measure: (lines: readonly ObservedLine[]) => readonly OpticalDepthFinding[],
): readonly OpticalDepthFinding[] {
  const { recording, fits, search, lines } = input;
  const map = finalAxisMap(input.registration, fits);
  const recordedNm = (line: HydrogenLine): number =>
    toRecordedNm(map, recording.medium === 'air' ? line.wavelengthAirNm : line.wavelengthVacuumNm);
  const hydrogenNm = [...balmerSeries, ...paschenSeries].map(recordedNm);
  const deuteriumNm = balmerSeries.map(({ upperLevel }) => recordedNm(hydrogenLine(upperLevel, 'D')));
  const isHydrogen = (nm: number): boolean =>
    [...hydrogenNm, ...(deuteriumRatio(input) > 0 ? deuteriumNm : [])].some(
      (at) => Math.abs(at - nm) < ownWidths * search.fwhmNm,
    );
  const around = {
    recording,
    clipped: recording.clipped.map((flag, px) =>
      others.some(({ clipped }) => clipped[px] === 1) ? 1 : flag,
    ),
    foreignNm: search.peaks
      .filter(({ signalToNoise }) => signalToNoise > foreignSignalToNoise)
      .map((peak) => peak.recordedNm)
      .filter((nm) => !isHydrogen(nm)),
    hydrogenNm,
    instrumentFwhmNm: fits.instrumentFwhmNm,
  };
  const shapes = gasShapes(input);
  const observed = lines.map((line) => observeLine(placeOf(input, line, recordedNm(line)), around, shapes));
  const findings = measure(observed.filter((each) => typeof each !== 'string'));
  return lines.map((line, index) => {
    const each = observed[index]!;
    return typeof each === 'string'
      ? notDetermined(line.id, method, each)
      : findings.find(({ lineId }) => lineId === line.id)!;
  });
}

const deuteriumRatio = ({ fits }: OpticalDepthInput): number =>
  fits.deuterium?.isFitted === true ? Math.max(0, fits.deuterium.ratio) : 0;

function placeOf(input: OpticalDepthInput, line: HydrogenLine, nominalNm: number): LinePlace {
  const { fits, search, recording } = input;
  const { wavelengthNm, edgeNm } = recording;
  const fit = fits.fits.find(({ id }) => id === line.id);
  const centreNm = fit?.recordedCentreNm ?? nominalNm;
  const px = pixelAt(wavelengthNm, centreNm);
  const pixelNm = edgeNm[px + 1]! - edgeNm[px]!;
  const ownNm =
    fit === undefined ? search.fwhmNm : voigtFwhmNm(fit.gaussianFwhmNm, Math.max(0, fit.lorentzianFwhmNm));
  const companion = fits.companions.find(
    ({ lineId, referenceNm, area }) =>
      lineId === line.id &&
      fit !== undefined &&
      area > companionShare * fit.area &&
      Math.abs(referenceNm - fit.referenceNm) < 1.5 * ownNm,
  );
  const deuterium = seriesLine(line.upperLevel, line.lowerLevel, 'D');
  return {
    line,
    centreNm,
    fwhmNm: fit === undefined ? ownNm : Math.sqrt(ownNm * ownNm + pixelSpread * pixelNm * pixelNm),
    isotopeShiftNm:
      deuteriumRatio(input) > 0 ? Math.abs(line.wavelengthVacuumNm - deuterium.wavelengthVacuumNm) : 0,
    blendedWith: companion === undefined ? null : `light of ${companion.species} lies under it`,
  };
}

/** The gas as best known, and one standard uncertainty either way of its temperature and of its electrons. */
function gasShapes(input: OpticalDepthInput): GasShapes {
  const { bench, fits, gas } = input;
  const { electrons, lamp } = gas;
  const kelvin = lamp.gasTemperatureK ?? defaultGasTemperatureK;
  const best: AbsorbingAtoms = {
    lamp: { ...lamp, gasTemperatureK: kelvin },
    electronsPerCubicMetre: electrons.middle,
    deuteriumRatio: deuteriumRatio(input),
  };
  const others: { low: AbsorbingAtoms; high: AbsorbingAtoms }[] = [];
  if (bench.lamp?.gasTemperatureK === undefined) {
    const { gasTemperature } = fits;
    const isSeen = gasTemperature !== null && gasTemperature.kelvin > 3 * gasTemperature.kelvinSigma;
    const lnSigma = isSeen ? gasTemperature.kelvinSigma / gasTemperature.kelvin : unknownGasLnSigma;
    const at = (factor: number): AbsorbingAtoms => ({
      ...best,
      lamp: { ...lamp, gasTemperatureK: factor * kelvin },
    });
    others.push({ low: at(exp(-lnSigma)), high: at(exp(lnSigma)) });
  }
  const { low, middle, high, halfRange } = electrons;
  if (high > low) {
    const at = (electronsPerCubicMetre: number): AbsorbingAtoms => ({ ...best, electronsPerCubicMetre });
    others.push({
      low: at(middle - (middle - low) / halfRange),
      high: at(middle + (high - middle) / halfRange),
    });
  }
  return { best, others };
}
