import { entryOf, keyOf, type RecordingEntry, type Slots, slotsOf } from './inputs.ts';
import type { SheetState } from './sheet-state.ts';

export interface Work {
  readonly key: string;
  readonly entry: RecordingEntry;
  readonly slots: Slots;
}

/** What is still to be computed, the shown recording first, then what is waited for, then the queue in order. */
export function workToDo(state: SheetState): readonly Work[] {
  const { inputs } = state;
  const shown = entryOf(inputs, inputs.selectedId);
  const awaited = inputs.recordings.filter((entry) => state.toShow.includes(entry.id));
  const inOrder = [...(shown === null ? [] : [shown]), ...awaited, ...inputs.recordings];
  const seen = new Set<string>();
  const work: Work[] = [];
  for (const entry of inOrder) {
    const key = keyOf(inputs, entry);
    if (seen.has(key) || state.outcomes.has(key)) continue;
    seen.add(key);
    work.push({ key, entry, slots: slotsOf(inputs, entry.setId) });
  }
  return work;
}
