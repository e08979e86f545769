import type { Bench } from '../bench/bench.ts';
import { buildFigures } from '../diagnosis/build-figures.ts';
import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import type { Figures } from '../diagnosis/figures.ts';
import { readBench } from '../bench/read-bench.ts';
import type { SpectralLine } from '../physics/spectral-line.ts';
import { readRecording } from '../recording/read-recording.ts';
import { readResponse } from '../recording/read-response.ts';
import type { Recording, ResponseTable } from '../recording/recording.ts';
import type { InputFile } from '../result/input-file.ts';
import { ok, type Result } from '../result/result.ts';
import type { PairRecordings } from './measure-optical-depths.ts';
import { type AnalysisOptions, diagnose, type DiagnoseOutput } from './diagnose.ts';

/** What every recording of a batch shares, parsed once. */
export interface Surroundings extends PairRecordings {
  readonly bench: Bench;
  readonly dark: Recording | null;
  readonly response: ResponseTable | null;
  readonly profile: Recording | null;
}

export interface SurroundingFiles {
  /** Lines of a lamp that the instrument's profile is measured on. */
  readonly profile?: InputFile | null;
  readonly mirror?: InputFile | null;
  readonly source?: InputFile | null;
  readonly through?: InputFile | null;
  readonly dark: InputFile | null;
  readonly response: InputFile | null;
  readonly bench: InputFile | null;
}

export interface DiagnoseSettings {
  readonly options: AnalysisOptions;
  readonly lineTable: readonly SpectralLine[];
  readonly programVersion: string;
  readonly onTrials?: (trials: number) => void;
}

export interface DiagnoseFilesInput extends SurroundingFiles, DiagnoseSettings {
  readonly recording: InputFile;
}

export interface ComputedRecording extends DiagnoseOutput {
  readonly recording: Recording;
}

/** A diagnosis with everything that screens and reports draw. */
export interface DiagnosedRecording {
  readonly diagnosis: Diagnosis;
  readonly figures: Figures;
  readonly recording: Recording;
}

/** Draws the figures of a computed recording: a step of its own, since most doors print numbers only. */
export function drawFigures({ diagnosis, evidence, recording }: ComputedRecording): DiagnosedRecording {
  return { diagnosis, figures: buildFigures(evidence, diagnosis.verdict), recording };
}

/** Parses bench, dark and response; the first that cannot be used is the answer. */
export function readSurroundings(files: SurroundingFiles): Result<Surroundings> {
  const bench: Result<Bench> = files.bench === null ? ok({}) : readBench(files.bench);
  if (!bench.ok) return bench;
  const dark = files.dark === null ? ok(null) : readRecording(files.dark, bench.value, 'dark');
  if (!dark.ok) return dark;
  const response = files.response === null ? ok(null) : readResponse(files.response, bench.value);
  if (!response.ok) return response;
  const profile = readPart(files.profile, bench.value, 'reference lamp recording');
  if (!profile.ok) return profile;
  const mirror = readPart(files.mirror, bench.value, 'mirror recording');
  if (!mirror.ok) return mirror;
  const source = readPart(files.source, bench.value, 'source recording');
  if (!source.ok) return source;
  const through = readPart(files.through, bench.value, 'recording through the tube');
  if (!through.ok) return through;
  return ok({
    bench: bench.value,
    dark: dark.value,
    response: response.value,
    profile: profile.value,
    mirror: mirror.value,
    source: source.value,
    through: through.value,
  });
}

function readPart(
  file: InputFile | null | undefined,
  bench: Bench,
  subject: string,
): Result<Recording | null> {
  return file === null || file === undefined ? ok(null) : readRecording(file, bench, subject);
}

/** Parses one recording and takes it through the chain, in surroundings that were parsed before. */
export function diagnoseFile(
  recordingFile: InputFile,
  surroundings: Surroundings,
  settings: DiagnoseSettings,
): Result<ComputedRecording> {
  const recording = readRecording(recordingFile, surroundings.bench);
  if (!recording.ok) return recording;
  const { bench, dark, response, profile, mirror, source, through } = surroundings;
  const { options, lineTable, programVersion, onTrials } = settings;
  // Field by field: what comes in may carry files under the same names.
  const output = diagnose({
    recording: recording.value,
    dark,
    response,
    profile,
    mirror,
    source,
    through,
    bench,
    options,
    lineTable,
    programVersion,
    ...(onTrials === undefined ? {} : { onTrials }),
  });
  return output.ok ? ok({ ...output.value, recording: recording.value }) : output;
}

/** Files in, diagnosis out: the one door into the chain for the command, the services and the page. */
export function diagnoseFiles(input: DiagnoseFilesInput): Result<ComputedRecording> {
  const surroundings = readSurroundings(input);
  if (!surroundings.ok) return surroundings;
  return diagnoseFile(input.recording, surroundings.value, input);
}
