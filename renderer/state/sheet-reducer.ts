import { defaultAnalysisOptions } from '../../shared-core/diagnosis/analysis-options.ts';
import { problemSentence } from '../../shared-core/result/result.ts';
import { filesAdded, savedOpened } from './add-files.ts';
import { computed } from './computed.ts';
import { changed, redone, undone } from './history.ts';
import {
  demoSet,
  entryOf,
  keyOf,
  roleNames,
  slotsOf,
  type ChoicesMade,
  withOptions,
  withoutRecording,
  withSlot,
} from './inputs.ts';
import { lineLabel } from '../../shared-core/report/line-label.ts';
import { noticed } from './notices.ts';
import type { SheetAction, SheetState } from './sheet-state.ts';

/** Everything that can happen on the Diagnose sheet, in one place. Pure. */
export function sheetReducer(state: SheetState, action: SheetAction): SheetState {
  switch (action.type) {
    case 'demo-opened': {
      const id = `r${String(state.nextId)}`;
      const recordings = [
        ...state.inputs.recordings.filter((entry) => entry.setId !== demoSet),
        { id, file: action.recording, setId: demoSet, options: defaultAnalysisOptions },
      ];
      const sets = { ...state.inputs.sets, [demoSet]: action.slots };
      const inputs = { recordings, sets, selectedId: id };
      const label = `Opened the demo recording ${action.recording.name}`;
      const opened = { ...state, nextId: state.nextId + 1 };
      // The first thing on an empty screen is no change that anyone would undo.
      if (state.inputs.recordings.length === 0 && state.past.length === 0) {
        return { ...opened, inputs, lastDone: label };
      }
      return changed(opened, inputs, label);
    }
    case 'files-added':
      return filesAdded(state, action.files);
    case 'saved-opened':
      return savedOpened(state, action);
    case 'selected':
      if (entryOf(state.inputs, action.recordingId) === null) return state;
      return {
        ...state,
        inputs: { ...state.inputs, selectedId: action.recordingId },
        toShow: [],
        onTrial: null,
      };
    case 'recording-removed': {
      const entry = entryOf(state.inputs, action.recordingId);
      if (entry === null) return state;
      return changed(state, withoutRecording(state.inputs, entry.id), `Removed ${entry.file.name}`);
    }
    case 'slot-removed': {
      const file = slotsOf(state.inputs, action.setId)[action.role];
      if (file === null) return state;
      return changed(
        state,
        withSlot(state.inputs, action.setId, action.role, null),
        `Removed the ${roleNames[action.role]} ${file.name}`,
      );
    }
    case 'recording-reassigned': {
      const entry = entryOf(state.inputs, action.recordingId);
      if (entry === null) return state;
      const without = withoutRecording(state.inputs, entry.id);
      return filesAdded(state, [{ file: entry.file, role: action.role }], without);
    }
    case 'slot-reassigned': {
      const file = slotsOf(state.inputs, action.setId)[action.from];
      if (file === null || action.role === action.from) return state;
      const without = withSlot(state.inputs, action.setId, action.from, null);
      return filesAdded(state, [{ file, role: action.role }], without);
    }
    case 'line-switched':
      return lineSwitched(state, action.recordingId, action.lineId);
    case 'choice-made': {
      const inputs = withOptions(state.inputs, action.recordingId, action.choices);
      return changed(state, inputs, choiceLabel(action.choices));
    }
    case 'computed':
      return computed(state, action.key, action.outcome);
    case 'undo':
      return undone(state);
    case 'redo':
      return redone(state);
    case 'stopped':
      return { ...state, isStopped: true, lastDone: 'Stopped; what was done stays' };
    case 'resumed':
      return { ...state, isStopped: false, lastDone: 'Going on' };
    case 'problem-met':
      return noticed(state, 'problem', problemSentence(action.problem));
    case 'said':
      return { ...state, lastDone: action.text };
    case 'notice-dismissed':
      return { ...state, notices: state.notices.filter((notice) => notice.id !== action.id) };
  }
}

function lineSwitched(state: SheetState, recordingId: string, lineId: string): SheetState {
  const entry = entryOf(state.inputs, recordingId);
  if (entry === null) return state;
  const { leftOut: before } = entry.options;
  const isOut = before.includes(lineId);
  const leftOut = isOut ? before.filter((id) => id !== lineId) : [...before, lineId];
  const inputs = withOptions(state.inputs, recordingId, { leftOut });
  return changed(
    state,
    inputs,
    isOut ? `Took ${lineLabel(lineId)} back in` : `Left out ${lineLabel(lineId)}`,
  );
}

/** What was chosen, for the status line and the undo history. */
function choiceLabel(choices: ChoicesMade): string {
  const { widening, selfAbsorption, levels } = choices;
  if ('monteCarlo' in choices)
    return choices.monteCarlo === undefined ? 'Dropped the Monte Carlo check' : 'Checked by Monte Carlo';
  if (widening !== undefined)
    return widening === 'birge' ? 'Chose to widen by the Birge ratio' : 'Chose not to widen the interval';
  if (selfAbsorption !== undefined)
    return selfAbsorption === 'correct'
      ? 'Chose to correct for self-absorption'
      : 'Chose only to report self-absorption';
  return levels === 'equilibrated' ? 'Chose levels in equilibrium only' : 'Chose all levels';
}

/** The key whose outcome belongs to the shown recording, or null when nothing is shown. */
export function shownKey(state: SheetState): string | null {
  const entry = entryOf(state.inputs, state.inputs.selectedId);
  return entry === null ? null : keyOf(state.inputs, entry);
}
