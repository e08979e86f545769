import { analysisOptionsSchema, type AnalysisOptions } from '../diagnosis/analysis-options.ts';
import { type Diagnosis, diagnosisSchema } from '../diagnosis/diagnosis.ts';
import { stringifyDiagnosis } from '../pipeline/stringify-diagnosis.ts';
import type { InputFile } from '../result/input-file.ts';
import { fail, ok, type Problem, type Result } from '../result/result.ts';
import { z } from '../schema/zod.ts';
import { decodeBase64, encodeBase64 } from './base64.ts';

/**
 * A saved diagnosis, schema `lampwright.saved-diagnosis/1`: every input file whole, the choices made on the
 * sheet and the diagnosis they gave, so that it can be recomputed anywhere and compared.
 */
export const savedSchemaName = 'lampwright.saved-diagnosis/1';

const savedFile = z.strictObject({
  name: z.string().min(1).max(255),
  sha256: z.string().regex(/^[0-9a-f]{64}$/),
  bytesBase64: z.string(),
});

const savedSchema = z.strictObject({
  schema: z.literal(savedSchemaName),
  inputs: z.strictObject({
    recording: savedFile,
    dark: savedFile.nullable(),
    response: savedFile.nullable(),
    bench: savedFile.nullable(),
    profile: savedFile.nullable(),
    mirror: savedFile.nullable(),
    source: savedFile.nullable(),
    through: savedFile.nullable(),
  }),
  options: analysisOptionsSchema,
  diagnosis: diagnosisSchema,
});

/** What a recording may be diagnosed with. */
const besides = ['dark', 'response', 'bench', 'profile', 'mirror', 'source', 'through'] as const;

export interface SavedDiagnosis {
  readonly recording: InputFile;
  readonly dark: InputFile | null;
  readonly response: InputFile | null;
  readonly bench: InputFile | null;
  readonly profile: InputFile | null;
  readonly mirror: InputFile | null;
  readonly source: InputFile | null;
  readonly through: InputFile | null;
  readonly options: AnalysisOptions;
  readonly diagnosis: Diagnosis;
}

/** The text of the file; the diagnosis in it is rounded as everywhere else it is printed. */
export function stringifySaved(saved: SavedDiagnosis): string {
  return `${JSON.stringify(
    {
      schema: savedSchemaName,
      inputs: {
        recording: savedFrom(saved.recording),
        ...Object.fromEntries(
          besides.map((part) => {
            const file = saved[part];
            return [part, file && savedFrom(file)];
          }),
        ),
      },
      options: saved.options,
      diagnosis: JSON.parse(stringifyDiagnosis(saved.diagnosis)) as unknown,
    },
    null,
    1,
  )}\n`;
}

const savedFrom = (file: InputFile): z.infer<typeof savedFile> => ({
  name: file.name,
  sha256: file.sha256,
  bytesBase64: encodeBase64(file.bytes),
});

/** Parses the text of a saved diagnosis; the host still has to hash the bytes and compare (`sha256` is as stated). */
export function parseSaved(text: string, fileName: string): Result<SavedDiagnosis> {
  const problem = (found: string): Result<never> => fail(notRecognised(fileName, found));
  let raw: unknown;
  try {
    raw = JSON.parse(text);
  } catch {
    return problem('text that is not JSON, as when a copy was cut short');
  }
  const parsed = savedSchema.safeParse(raw);
  if (!parsed.success) {
    const issue = parsed.error.issues[0];
    return problem(issue === undefined ? 'something else' : `${issue.path.join('.')}: ${issue.message}`);
  }
  const { inputs, options, diagnosis } = parsed.data;
  const files: Record<keyof typeof inputs, InputFile | null> = {
    recording: null,
    dark: null,
    response: null,
    bench: null,
    profile: null,
    mirror: null,
    source: null,
    through: null,
  };
  for (const part of ['recording', ...besides] as const) {
    const kept = inputs[part];
    if (kept === null) continue;
    const bytes = decodeBase64(kept.bytesBase64);
    if (bytes === null) return problem(`damaged bytes of the ${part} "${kept.name}"`);
    files[part] = { name: kept.name, sha256: kept.sha256, bytes };
  }
  const { recording, ...others } = files;
  if (recording === null) return problem('no recording in it');
  return ok({ recording, ...others, options, diagnosis });
}

/** The Problem for a file that claims to be a saved diagnosis and cannot be used as one. */
export const notRecognised = (fileName: string, found: string): Problem => ({
  code: 'saved.not-recognised',
  fileName,
  lineNumber: null,
  subject: 'saved diagnosis',
  expected: `a whole file of schema ${savedSchemaName}`,
  found,
  remedy: 'Open another copy of it, or the recording itself; what was open stays open.',
});
