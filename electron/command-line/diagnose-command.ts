import { defaultAnalysisOptions } from '../../shared-core/diagnosis/analysis-options.ts';
import {
  type ComputedRecording,
  diagnoseFile,
  type DiagnoseSettings,
} from '../../shared-core/pipeline/diagnose-files.ts';
import type { InputFile } from '../../shared-core/result/input-file.ts';
import { type Problem, problemSentence, type Result } from '../../shared-core/result/result.ts';
import { programVersion } from '../services/app-root.ts';
import { loadLineTable } from '../services/line-table.ts';
import { readInputFile } from '../services/read-input-file.ts';
import { diagnoseArguments } from './diagnose-arguments.ts';
import { createPrinter, type Printer } from './diagnosis-printer.ts';
import type { Output } from './output.ts';
import { planWork, type Work } from './plan-work.ts';
import { createReportWriter } from './report-writer.ts';
import type { ExitStatus } from './exit-status.ts';
import { createSurroundingsCache } from './surroundings-cache.ts';

/** The same recording gives the same trials, in the window as well. */
const monteCarloSeed = 1;

/** `lampwright diagnose`: every recording in input order; what cannot be used is said and passed over. */
export async function diagnoseCommand(words: readonly string[], output: Output): Promise<ExitStatus> {
  const args = diagnoseArguments(words);
  const plan = await planWork(args);
  const work = plan.items.filter((item) => item.ok).map((item) => item.value);
  const report = await createReportWriter(args.report, work.length);
  const printer = createPrinter(args.format, { isList: plan.isList, work });
  const surroundings = createSurroundingsCache(args);
  let status: ExitStatus = 0;
  const complain = (line: string): void => {
    status = 1;
    output.complain(line);
  };

  const lineTable = await loadLineTable();
  if (!lineTable.ok) {
    complain(problemSentence(lineTable.problem));
    return status;
  }
  const settings: DiagnoseSettings = {
    options: args.monteCarlo
      ? { ...defaultAnalysisOptions, monteCarlo: { seed: monteCarloSeed } }
      : defaultAnalysisOptions,
    lineTable: lineTable.value,
    programVersion: programVersion(),
  };

  await output.print(printer.opening);
  for (const item of plan.items) {
    if (!item.ok) {
      complain(problemSentence(item.problem));
      continue;
    }
    const around = await surroundings.of(item.value.bench);
    if (!around.ok) {
      if (around.isNew) complain(problemSentence(around.problem));
      continue;
    }
    const diagnosed = await diagnoseOne(
      item.value,
      (file) => diagnoseFile(file, around.value, settings),
      printer,
    );
    if (!diagnosed.ok) {
      complain(diagnosed.sentence);
      continue;
    }
    await output.print(diagnosed.text);
    try {
      const reportFault = await report.write(diagnosed.value, item.value, around.value.bench);
      if (reportFault !== null) complain(reportFault);
    } catch (error) {
      complain(ownFault(item.value, error));
    }
  }
  await output.print(printer.closing());
  return status;
}

type Diagnosed =
  | { readonly ok: true; readonly value: ComputedRecording; readonly text: string }
  | { readonly ok: false; readonly sentence: string };

async function diagnoseOne(
  work: Work,
  compute: (file: InputFile) => Result<ComputedRecording>,
  printer: Printer,
): Promise<Diagnosed> {
  const file = await readInputFile(work.path, 'recording');
  if (!file.ok) return { ok: false, sentence: sentenceWithPath(file.problem, file.problem.fileName, work) };
  try {
    const diagnosed = compute(file.value);
    if (diagnosed.ok) return { ...diagnosed, text: printer.textOf(diagnosed.value.diagnosis, work) };
    return { ok: false, sentence: sentenceWithPath(diagnosed.problem, file.value.name, work) };
  } catch (error) {
    return { ok: false, sentence: ownFault(work, error) };
  }
}

/** A fault of this program on one recording must not take the rest of the batch with it. */
function ownFault(work: Work, error: unknown): string {
  const message = error instanceof Error ? error.message : String(error);
  const detail = message.replace(/\s+/g, ' ').slice(0, 300);
  return `Lampwright itself failed on "${work.path}": ${detail}. Please report it with the file.`;
}

/** Names the recording by its path as typed: two folders may hold files of one name. */
function sentenceWithPath(problem: Problem, recordingName: string | null, work: Work): string {
  const isAboutRecording = problem.fileName === recordingName;
  return problemSentence(isAboutRecording ? { ...problem, fileName: work.path } : problem);
}
