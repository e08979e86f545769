import type { AnalysisOptions } from '../../shared-core/diagnosis/analysis-options.ts';
import type { DiagnosedRecording } from '../../shared-core/pipeline/diagnose-files.ts';
import type { InputFile } from '../../shared-core/result/input-file.ts';
import type { Result } from '../../shared-core/result/result.ts';

/** What every diagnosis of a worker's life shares; sent once, first. */
export interface WorkerSetup {
  readonly lineTableCsv: string;
  readonly programVersion: string;
}

export interface DiagnoseRequest {
  readonly recording: InputFile;
  readonly dark: InputFile | null;
  readonly response: InputFile | null;
  readonly bench: InputFile | null;
  readonly profile: InputFile | null;
  readonly mirror: InputFile | null;
  readonly source: InputFile | null;
  readonly through: InputFile | null;
  readonly options: AnalysisOptions;
}

export type ToWorker =
  | { readonly kind: 'setup'; readonly setup: WorkerSetup }
  | { readonly kind: 'diagnose'; readonly request: DiagnoseRequest };

export type FromWorker =
  | { readonly kind: 'trials'; readonly trials: number }
  | { readonly kind: 'done'; readonly outcome: Result<DiagnosedRecording> };
