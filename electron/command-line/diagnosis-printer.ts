import { basename } from 'node:path';
import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import {
  stringifyDiagnosis,
  stringifyDiagnosisOnOneLine,
} from '../../shared-core/pipeline/stringify-diagnosis.ts';
import { csvHead, csvRow } from './csv-rows.ts';
import type { Format } from './diagnose-arguments.ts';
import type { Work } from './plan-work.ts';
import { sheetOf } from './text-sheet.ts';
import { summaryColumns, summaryHead, summaryRow } from './text-summary.ts';

/** Text for standard output, piece by piece, so that each recording shows as soon as it is done. */
export interface Printer {
  readonly opening: string;
  textOf(diagnosis: Diagnosis, work: Work): string;
  closing(): string;
}

export interface PrinterSettings {
  readonly isList: boolean;
  readonly work: readonly Work[];
}

export function createPrinter(format: Format, settings: PrinterSettings): Printer {
  switch (format) {
    case 'json':
      return settings.isList ? jsonList() : onlyText((diagnosis) => `${stringifyDiagnosis(diagnosis)}\n`);
    case 'ndjson':
      return onlyText((diagnosis) => `${stringifyDiagnosisOnOneLine(diagnosis)}\n`);
    case 'csv':
      return { ...onlyText((diagnosis) => csvRow(asInJson(diagnosis))), opening: csvHead };
    case 'text':
      return settings.isList
        ? summary(settings.work)
        : onlyText((diagnosis, work) => sheetOf(asInJson(diagnosis), work));
  }
}

/** Checked and rounded as --json has it, so that every format shows the same numbers. */
const asInJson = (diagnosis: Diagnosis): Diagnosis => JSON.parse(stringifyDiagnosis(diagnosis)) as Diagnosis;

const onlyText = (textOf: Printer['textOf']): Printer => ({ opening: '', textOf, closing: () => '' });

function jsonList(): Printer {
  let isFirst = true;
  return {
    opening: '[',
    textOf(diagnosis) {
      const text = stringifyDiagnosis(diagnosis);
      const before = isFirst ? '\n' : ',\n';
      isFirst = false;
      return before + text;
    },
    closing: () => (isFirst ? ']\n' : '\n]\n'),
  };
}

function summary(work: readonly Work[]): Printer {
  const columns = summaryColumns(work.map(({ path }) => basename(path)));
  return {
    opening: work.length === 0 ? '' : summaryHead(columns),
    textOf: (diagnosis) => summaryRow(asInJson(diagnosis), columns),
    closing: () => '',
  };
}
