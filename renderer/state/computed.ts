import { compareDiagnoses } from '../../shared-core/saved/compare-diagnoses.ts';
import { problemSentence } from '../../shared-core/result/result.ts';
import { demoSet, entryOf, keyOf, type RecordingEntry, withoutDemo } from './inputs.ts';
import { noticed } from './notices.ts';
import type { Outcome, SheetState } from './sheet-state.ts';

/** An outcome came back from the worker. */
export function computed(state: SheetState, key: string, outcome: Outcome): SheetState {
  const outcomes = new Map(state.outcomes).set(key, outcome);
  const owners = state.inputs.recordings.filter((entry) => keyOf(state.inputs, entry) === key);
  const next = { ...state, outcomes };
  if (!outcome.ok) return failed(next, key, problemSentence(outcome.problem));
  const lastGood = { ...state.lastGood };
  for (const entry of owners) lastGood[entry.id] = key;
  const onTrial = state.onTrial?.key === key ? null : state.onTrial;
  return compared(shownFirst({ ...next, lastGood, onTrial }, owners), key);
}

/** A failure is said once. What was put on trial is taken back; everything else stays marked in the tray. */
function failed(state: SheetState, key: string, sentence: string): SheetState {
  if (state.onTrial?.key !== key) return noticed(state, 'problem', sentence);
  const step = state.past.at(-1);
  if (step === undefined) return noticed(state, 'problem', sentence);
  const before = { ...state, past: state.past.slice(0, -1), inputs: step.inputs, onTrial: null };
  return noticed(
    { ...before, lastDone: `${state.onTrial.fileName} was not taken; everything is as before` },
    'problem',
    sentence,
  );
}

/** The first new recording that stands is shown, and the demo then makes room. */
function shownFirst(state: SheetState, owners: readonly RecordingEntry[]): SheetState {
  const first = owners.find((entry) => state.toShow.includes(entry.id));
  if (first === undefined) return state;
  const inputs = { ...state.inputs, selectedId: first.id };
  return { ...state, inputs: first.setId === demoSet ? inputs : withoutDemo(inputs), toShow: [] };
}

/** Says whether a reopened diagnosis still gives the same numbers. */
function compared(state: SheetState, key: string): SheetState {
  const { reopened } = state;
  const entry = reopened === null ? null : entryOf(state.inputs, reopened.recordingId);
  const outcome = state.outcomes.get(key);
  if (reopened === null || entry === null || keyOf(state.inputs, entry) !== key) return state;
  if (outcome?.ok !== true) return state;
  const now = outcome.value.diagnosis;
  const differences = compareDiagnoses(reopened.diagnosis, now);
  const [first] = differences;
  const before = `version ${reopened.diagnosis.program.version}`;
  const text =
    first === undefined
      ? `${reopened.fileName}: recomputed, and every number is the same as when it was saved (${before}).`
      : `${reopened.fileName}: recomputed with version ${now.program.version}, and ` +
        `${differences.length === 1 ? 'one entry differs' : `${String(differences.length)} entries differ`} ` +
        `from what ${before} had saved; the first is ${first.path}: saved ${first.before}, now ${first.now}.`;
  return noticed({ ...state, reopened: null }, first === undefined ? 'news' : 'problem', text);
}
