import type { Dispatch } from 'react';
import { stringifyDiagnosis } from '../../shared-core/pipeline/stringify-diagnosis.ts';
import { buildHtmlReport } from '../../shared-core/report/build-html-report.ts';
import { cautionsFor } from '../../shared-core/safety/cautions.ts';
import { stringifySaved } from '../../shared-core/saved/saved-diagnosis.ts';
import { saveText } from '../client/files.ts';
import { slotsOf } from './inputs.ts';
import type { SheetAction, SheetState } from './sheet-state.ts';
import { shownBench, shownOf } from './shown.ts';

export interface Saving {
  readonly canSave: boolean;
  readonly saveReport: () => void;
  readonly saveDiagnosis: () => void;
  readonly saveJson: () => void;
}

/** Saves what is shown; never numbers that a newer change has overtaken. */
export function useSaving(state: SheetState, dispatch: Dispatch<SheetAction>): Saving {
  const shown = shownOf(state);
  const current = shown.kind === 'diagnosed' && shown.isCurrent ? shown : null;
  const save =
    (ending: string, mediaType: string, textOf: (from: NonNullable<typeof current>) => string) => () => {
      if (current === null) {
        dispatch({ type: 'said', text: 'Nothing to save yet' });
        return;
      }
      const name = `${current.entry.file.name.replace(/\.[^.]*$/, '')}.${ending}`;
      saveText(name, mediaType, textOf(current));
      dispatch({ type: 'said', text: `Saved ${name}` });
    };
  return {
    canSave: current !== null,
    saveReport: save('report.html', 'text/html', ({ output }) =>
      buildHtmlReport({
        diagnosis: output.diagnosis,
        figures: output.figures,
        cautions: cautionsFor(shownBench(state)),
        bench: shownBench(state),
        generatedAt: new Date().toISOString(),
      }),
    ),
    saveDiagnosis: save('lampwright.json', 'application/json', ({ entry, output }) =>
      stringifySaved({
        recording: entry.file,
        ...slotsOf(state.inputs, entry.setId),
        options: entry.options,
        diagnosis: output.diagnosis,
      }),
    ),
    saveJson: save(
      'diagnosis.json',
      'application/json',
      ({ output }) => `${stringifyDiagnosis(output.diagnosis)}\n`,
    ),
  };
}
