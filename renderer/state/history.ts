import { entryOf, type Inputs } from './inputs.ts';
import type { SheetState } from './sheet-state.ts';

/** Deep enough for an afternoon; files are shared between steps, so a step costs next to nothing. */
const maxSteps = 200;

/** A change of the inputs that undo can bring back. */
export function changed(state: SheetState, inputs: Inputs, label: string): SheetState {
  return {
    ...state,
    past: [...state.past, { inputs: state.inputs, label }].slice(-maxSteps),
    inputs,
    future: [],
    onTrial: null,
    toShow: [],
    reopened: null,
    isStopped: false,
    lastDone: label,
  };
}

export function undone(state: SheetState): SheetState {
  const step = state.past.at(-1);
  if (step === undefined) return { ...state, lastDone: 'Nothing to undo' };
  return {
    ...state,
    past: state.past.slice(0, -1),
    inputs: keepSelection(step.inputs, state.inputs.selectedId),
    future: [...state.future, { inputs: state.inputs, label: step.label }],
    onTrial: null,
    toShow: [],
    reopened: null,
    isStopped: false,
    lastDone: `Undone: ${step.label}`,
  };
}

export function redone(state: SheetState): SheetState {
  const step = state.future.at(-1);
  if (step === undefined) return { ...state, lastDone: 'Nothing to redo' };
  return {
    ...state,
    past: [...state.past, { inputs: state.inputs, label: step.label }],
    inputs: keepSelection(step.inputs, state.inputs.selectedId),
    future: state.future.slice(0, -1),
    onTrial: null,
    toShow: [],
    reopened: null,
    isStopped: false,
    lastDone: `Redone: ${step.label}`,
  };
}

/** Looking at another recording is no change, so undo leaves the eye where it is when it can. */
function keepSelection(inputs: Inputs, selectedId: string | null): Inputs {
  return entryOf(inputs, selectedId) === null ? inputs : { ...inputs, selectedId };
}
