import type { InputOf } from '../../shared-core/contract/service-table.ts';
import { diagnoseFiles } from '../../shared-core/pipeline/diagnose-files.ts';
import { stringifyDiagnosis } from '../../shared-core/pipeline/stringify-diagnosis.ts';
import type { InputFile } from '../../shared-core/result/input-file.ts';
import { ok, type Result } from '../../shared-core/result/result.ts';
import { programVersion } from './app-root.ts';
import { loadLineTable } from './line-table.ts';
import { fileFromPayload } from './payload.ts';

export type DiagnosisJob = InputOf<'diagnosis.run'>;
export type DiagnosisAnswer = Result<{ readonly diagnosisJson: string }>;

/** One diagnosis from files on the wire. Runs in the compute worker, away from the thread of the window. */
export async function runDiagnosis(job: DiagnosisJob): Promise<DiagnosisAnswer> {
  const recording = fileFromPayload(job.recording, 'recording');
  if (!recording.ok) return recording;
  const dark = optional(job.dark, 'dark');
  if (!dark.ok) return dark;
  const response = optional(job.response, 'response table');
  if (!response.ok) return response;
  const bench = optional(job.bench, 'bench file');
  if (!bench.ok) return bench;
  const profile = optional(job.profile, 'reference lamp recording');
  if (!profile.ok) return profile;
  const mirror = optional(job.mirror, 'mirror recording');
  if (!mirror.ok) return mirror;
  const source = optional(job.source, 'source recording');
  if (!source.ok) return source;
  const through = optional(job.through, 'recording through the tube');
  if (!through.ok) return through;
  const lineTable = await loadLineTable();
  if (!lineTable.ok) return lineTable;
  const diagnosed = diagnoseFiles({
    recording: recording.value,
    dark: dark.value,
    response: response.value,
    bench: bench.value,
    profile: profile.value,
    mirror: mirror.value,
    source: source.value,
    through: through.value,
    options: job.options,
    lineTable: lineTable.value,
    programVersion: programVersion(),
  });
  return diagnosed.ok ? ok({ diagnosisJson: stringifyDiagnosis(diagnosed.value.diagnosis) }) : diagnosed;
}

function optional(payload: DiagnosisJob['dark'] | undefined, subject: string): Result<InputFile | null> {
  return payload === null || payload === undefined ? ok(null) : fileFromPayload(payload, subject);
}
