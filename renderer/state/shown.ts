import { type Bench } from '../../shared-core/bench/bench.ts';
import { readBench } from '../../shared-core/bench/read-bench.ts';
import type { DiagnosedRecording } from '../../shared-core/pipeline/diagnose-files.ts';
import { type Problem } from '../../shared-core/result/result.ts';
import { entryOf, keyOf, ownSet, type RecordingEntry, type Slots, slotsOf } from './inputs.ts';
import type { SheetState } from './sheet-state.ts';

/** What the sheet shows for the chosen recording. */
export type Shown =
  | { readonly kind: 'nothing' }
  | { readonly kind: 'waiting'; readonly entry: RecordingEntry }
  | { readonly kind: 'unusable'; readonly entry: RecordingEntry; readonly problem: Problem }
  | {
      readonly kind: 'diagnosed';
      readonly entry: RecordingEntry;
      readonly output: DiagnosedRecording;
      /** False while a newer diagnosis is being computed, or when the last change could not be used. */
      readonly isCurrent: boolean;
    };

export function shownOf(state: SheetState): Shown {
  const entry = entryOf(state.inputs, state.inputs.selectedId);
  if (entry === null) return { kind: 'nothing' };
  const outcome = state.outcomes.get(keyOf(state.inputs, entry));
  if (outcome?.ok === true) return { kind: 'diagnosed', entry, output: outcome.value, isCurrent: true };
  if (outcome !== undefined) return { kind: 'unusable', entry, problem: outcome.problem };
  const lastKey = state.lastGood[entry.id];
  const last = lastKey === undefined ? undefined : state.outcomes.get(lastKey);
  return last?.ok === true
    ? { kind: 'diagnosed', entry, output: last.value, isCurrent: false }
    : { kind: 'waiting', entry };
}

/** The bench of the chosen recording; empty when there is none or it cannot be read. */
export function shownBench(state: SheetState): Bench {
  const entry = entryOf(state.inputs, state.inputs.selectedId);
  const file = entry === null ? null : slotsOf(state.inputs, entry.setId).bench;
  if (file === null) return {};
  const bench = readBench(file);
  return bench.ok ? bench.value : {};
}

/** The set whose dark, response and bench the tray lists, and those that wait for a recording of their own. */
export function traySlots(state: SheetState): {
  readonly setId: string;
  readonly slots: Slots;
  readonly isWaiting: boolean;
} {
  const entry = entryOf(state.inputs, state.inputs.selectedId);
  const own = slotsOf(state.inputs, ownSet);
  const hasOwnRecording = state.inputs.recordings.some((each) => each.setId === ownSet);
  const isWaiting = !hasOwnRecording && Object.values(own).some((file) => file !== null);
  if (isWaiting || entry === null) return { setId: ownSet, slots: own, isWaiting };
  return { setId: entry.setId, slots: slotsOf(state.inputs, entry.setId), isWaiting: false };
}
