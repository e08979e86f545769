import type { Bench } from '../bench/bench.ts';
import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import type { Figures } from '../diagnosis/figures.ts';
import type { SpectralLine } from '../physics/spectral-line.ts';
import type { Recording, ResponseTable } from '../recording/recording.ts';
import { invariant, type Result } from '../result/result.ts';

/** Choices a person makes on the sheet; they override the bench file. */
export interface AnalysisOptions {
  /** Line ids the person switched off. */
  readonly leftOut: readonly string[];
}

export const defaultAnalysisOptions: AnalysisOptions = Object.freeze({ leftOut: Object.freeze([]) });

export interface DiagnoseInput {
  readonly recording: Recording;
  readonly dark: Recording | null;
  readonly response: ResponseTable | null;
  readonly bench: Bench;
  readonly options: AnalysisOptions;
  /** Impurity lines and bandheads to look for; the shipped table is assets/lines/lines.csv. */
  readonly lineTable: readonly SpectralLine[];
  readonly programVersion: string;
}

export interface DiagnoseOutput {
  readonly diagnosis: Diagnosis;
  readonly figures: Figures;
}

/** The whole chain, recording in, diagnosis out. Pure: same input, same output to the last digit. */
export function diagnose(input: DiagnoseInput): Result<DiagnoseOutput> {
  invariant(input.recording.signal.length > 0, 'the chain is being assembled');
  throw new Error('the chain is being assembled');
}
