import { findPeaks } from '../axis/find-peaks.ts';
import { registerAxis } from '../axis/register-axis.ts';
import type { Bench } from '../bench/bench.ts';
import { choicesOf, type AnalysisOptions } from '../diagnosis/analysis-options.ts';
import { assembleDiagnosis } from '../diagnosis/assemble.ts';
import { balmerLines, defaultUpperLevels } from '../diagnosis/balmer-lines.ts';
import { choiceNotes } from '../diagnosis/choice-notes.ts';
import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import type { Evidence } from '../diagnosis/evidence.ts';
import { fitLines } from '../lines/fit-lines.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { correctRecording } from '../noise/correct-recording.ts';
import { seriesLine, type HydrogenLine } from '../physics/hydrogen.ts';
import type { SpectralLine } from '../physics/spectral-line.ts';
import { checkByDrawing } from '../populations/check-by-drawing.ts';
import { coversNm } from '../populations/response-at.ts';
import { withoutStrayLight } from '../populations/response-errors.ts';
import { standsOut } from '../populations/temperature.ts';
import type { Recording, ResponseTable } from '../recording/recording.ts';
import { fail, ok, type Result } from '../result/result.ts';
import { findImpurities } from './find-impurities.ts';
import { measureOpticalDepths, type PairRecordings } from './measure-optical-depths.ts';
import { withMeasuredProfile } from './instrument-profile.ts';
import { judgePopulations } from './judge-populations.ts';

export { defaultAnalysisOptions, type AnalysisOptions } from '../diagnosis/analysis-options.ts';

export const defaultCoverage = 0.95;

export interface DiagnoseInput extends Partial<PairRecordings> {
  readonly recording: Recording;
  readonly dark: Recording | null;
  readonly response: ResponseTable | null;
  /** A lamp with sharp lines, which show the instrument's profile. */
  readonly profile?: Recording | null;
  readonly bench: Bench;
  readonly options: AnalysisOptions;
  /** Impurity lines and bandheads to look for; the shipped table is assets/lines/lines.csv. */
  readonly lineTable: readonly SpectralLine[];
  readonly programVersion: string;
  /** Told the number of Monte Carlo trials after every batch. */
  readonly onTrials?: (trials: number) => void;
}

export interface DiagnoseOutput {
  readonly diagnosis: Diagnosis;
  /** What the diagnosis rests on; buildFigures draws from it. */
  readonly evidence: Evidence;
}

/** The whole chain, recording in, diagnosis out. Pure: same input, same output to the last digit. */
export function diagnose(input: DiagnoseInput): Result<DiagnoseOutput> {
  const { options } = input;
  const { bench, profile, instrumentTerms } = withMeasuredProfile(input);
  const response = input.response === null ? null : withoutStrayLight(input.response, bench);
  const coverage = bench.analysis?.coverage ?? defaultCoverage;
  const upperLevels = bench.analysis?.upperLevels ?? defaultUpperLevels;
  const corrected = correctRecording(input.recording, input.dark, bench);
  if (!corrected.ok) return corrected;
  const recording = corrected.value;

  const balmer = balmerLines(upperLevels);
  const search = findPeaks(recording, bench.instrument?.fwhmNm ?? null);
  const registration = registerAxis(
    search.peaks,
    balmerLines(patternLevels(upperLevels)).map(({ id, wavelengthAirNm, wavelengthVacuumNm }) => ({
      id,
      referenceNm: recording.medium === 'air' ? wavelengthAirNm : wavelengthVacuumNm,
    })),
    {
      firstNm: recording.wavelengthNm[0]!,
      lastNm: recording.wavelengthNm[recording.wavelengthNm.length - 1]!,
      fwhmNm: search.fwhmNm,
    },
  );
  const isRegistered = registration.status === 'registered';
  const lines = [...balmer, ...paschenLinesIn(recording)];
  const fits = fitLines({
    recording,
    registration,
    search,
    lines: isRegistered ? lines : [],
    bench,
    instrumentTerms,
  });
  const fittedLines = fits.fits.map(({ id }) => lines.find((line) => line.id === id)!);

  const uncovered = fits.fits.find(
    (fit) =>
      response !== null &&
      balmer.some(({ id }) => id === fit.id) &&
      !options.leftOut.includes(fit.id) &&
      standsOut(fit) &&
      !coversNm(response, fit.referenceNm),
  );
  if (uncovered !== undefined && response !== null) return fail(coverageProblem(response, uncovered));

  const choices = choicesOf(bench, options);
  const populations = judgePopulations({
    fits,
    fittedLines,
    response,
    bench,
    choices,
    leftOut: options.leftOut,
    coverage,
    whyNoFits: isRegistered ? null : 'the Balmer pattern could not be recognised, so no line can be named',
  });
  const opticalDepths = measureOpticalDepths({
    recording,
    dark: input.dark,
    bench,
    search,
    registration,
    fits,
    lines: balmer,
    gas: populations.gas,
    coverage,
    mirror: input.mirror ?? null,
    source: input.source ?? null,
    through: input.through ?? null,
  });
  if (!opticalDepths.ok) return opticalDepths;
  const evidence: Evidence = {
    recording,
    bench,
    response,
    search,
    registration,
    fits,
    fittedLines,
    ...populations,
    drawn:
      options.monteCarlo === undefined
        ? null
        : checkByDrawing(populations.temperature, options.monteCarlo.seed, input.onTrials ?? (() => {})),
    profile,
    opticalDepths: opticalDepths.value.findings,
    choices,
    identification: isRegistered
      ? findImpurities({ recording, search, registration, fits, lineTable: input.lineTable })
      : null,
    leftOut: options.leftOut,
  };
  const diagnosis = assembleDiagnosis({
    evidence,
    programVersion: input.programVersion,
    recordingMedium: input.recording.medium,
    dark: nameOf(input.dark),
    profile: nameOf(input.profile ?? null),
    mirror: nameOf(input.mirror ?? null),
    source: nameOf(input.source ?? null),
    through: nameOf(input.through ?? null),
    upperLevels,
    coverage,
    notes: [...input.recording.notes, ...recording.notes, ...opticalDepths.value.notes]
      .map(({ text }) => text)
      .concat(strayLightNotes(input), choiceNotes(evidence)),
  });
  return ok({ diagnosis, evidence });
}

/**
 * Paschen lines in the range of the recording: those of the levels that Balmer lines come from test the response, for
 * both then measure the same population.
 */
function paschenLinesIn({ wavelengthNm, medium }: CorrectedRecording): readonly HydrogenLine[] {
  const first = wavelengthNm[0]!;
  const last = wavelengthNm[wavelengthNm.length - 1]!;
  return paschenUpperLevels
    .map((level) => seriesLine(level, 3))
    .filter((line) => {
      const nm = medium === 'air' ? line.wavelengthAirNm : line.wavelengthVacuumNm;
      return nm > first && nm < last;
    });
}

/** Paschen-beta to Paschen-10: beyond, the lines run into each other and into the series limit at 820 nm. */
const paschenUpperLevels = [5, 6, 7, 8, 9, 10];

/** The pattern is recognised by the strong members even when fewer are analysed. */
function patternLevels(upperLevels: readonly number[]): readonly number[] {
  return [...defaultUpperLevels, ...upperLevels.filter((level) => level <= 10)];
}

const nameOf = (file: Recording | null): { name: string; sha256: string } | null =>
  file === null ? null : { name: file.name, sha256: file.sha256 };

function strayLightNotes({ response, bench }: DiagnoseInput): string[] {
  const share = bench.response?.strayLight?.share ?? 0;
  return response !== null && share > 0
    ? [`Stray light of the standard lamp was taken out of the response table (share ${String(share)}).`]
    : [];
}

function coverageProblem(
  response: ResponseTable,
  fit: { readonly id: string; readonly referenceNm: number },
) {
  const { wavelengthNm } = response;
  return {
    code: 'response.coverage',
    subject: 'response table',
    fileName: response.name,
    lineNumber: null,
    expected: `rows that reach ${fit.id} at ${fit.referenceNm.toFixed(1)} nm`,
    found: `${wavelengthNm[0]!.toFixed(1)} to ${wavelengthNm[wavelengthNm.length - 1]!.toFixed(1)} nm`,
    remedy: `Give a table that covers the line, or leave ${fit.id} out of analysis.upperLevels.`,
  } as const;
}
