import type { AnalysisOptions } from '../../shared-core/diagnosis/analysis-options.ts';
import type { InputFile } from '../../shared-core/result/input-file.ts';

/** What a file is used as. */
export type SlotRole = 'dark' | 'response' | 'bench' | 'profile' | 'mirror' | 'source' | 'through';
export type Role = 'recording' | SlotRole;

export const slotRoles: readonly SlotRole[] = [
  'dark',
  'response',
  'bench',
  'profile',
  'mirror',
  'source',
  'through',
];

export const roleNames: Readonly<Record<Role, string>> = Object.freeze({
  recording: 'recording',
  dark: 'dark',
  response: 'response',
  bench: 'bench file',
  profile: 'reference lamp',
  mirror: 'mirror',
  source: 'source',
  through: 'through tube',
});

export type Slots = Readonly<Record<SlotRole, InputFile | null>>;

export const emptySlots: Slots = Object.freeze({
  dark: null,
  response: null,
  bench: null,
  profile: null,
  mirror: null,
  source: null,
  through: null,
});

/** Choices in judging the populations. */
export type ChoicesMade = Omit<AnalysisOptions, 'leftOut'>;

/** A recording in the tray and the choices made for it. */
export interface RecordingEntry {
  readonly id: string;
  readonly file: InputFile;
  /** Recordings of one set share dark, response and bench: the demo's never touch a person's own. */
  readonly setId: string;
  /** What the person chose on the sheet: lines left out, how the populations are judged. */
  readonly options: AnalysisOptions;
}

/** Everything the numbers follow from. One such object is one step of the undo history. */
export interface Inputs {
  readonly recordings: readonly RecordingEntry[];
  readonly sets: Readonly<Record<string, Slots>>;
  readonly selectedId: string | null;
}

export const demoSet = 'demo';
export const ownSet = 'own';

export const noInputs: Inputs = Object.freeze({ recordings: [], sets: {}, selectedId: null });

export const slotsOf = (inputs: Inputs, setId: string): Slots => inputs.sets[setId] ?? emptySlots;

export const entryOf = (inputs: Inputs, id: string | null): RecordingEntry | null =>
  inputs.recordings.find((entry) => entry.id === id) ?? null;

/** The set that a new file joins: that of the shown recording, but never the demo's. */
export function joinedSet(inputs: Inputs): string {
  const shown = entryOf(inputs, inputs.selectedId);
  return shown === null || shown.setId === demoSet ? ownSet : shown.setId;
}

/** Name under which an outcome is kept: the same files and choices give the same key. */
export function outcomeKey(entry: RecordingEntry, slots: Slots): string {
  const part = (file: InputFile | null): readonly string[] => (file === null ? [] : [file.name, file.sha256]);
  return JSON.stringify([
    part(entry.file),
    ...slotRoles.map((role) => part(slots[role])),
    Object.entries({ ...entry.options, leftOut: [...entry.options.leftOut].sort() })
      .filter(([, choice]) => choice !== undefined)
      .sort(),
  ]);
}

export const keyOf = (inputs: Inputs, entry: RecordingEntry): string =>
  outcomeKey(entry, slotsOf(inputs, entry.setId));

export function withSlot(inputs: Inputs, setId: string, role: SlotRole, file: InputFile | null): Inputs {
  return { ...inputs, sets: { ...inputs.sets, [setId]: { ...slotsOf(inputs, setId), [role]: file } } };
}

export function withEntry(
  inputs: Inputs,
  id: string,
  change: (entry: RecordingEntry) => RecordingEntry,
): Inputs {
  return {
    ...inputs,
    recordings: inputs.recordings.map((entry) => (entry.id === id ? change(entry) : entry)),
  };
}

/** With some choices for one recording changed, the others kept. */
export function withOptions(inputs: Inputs, id: string, changed: Partial<AnalysisOptions>): Inputs {
  return withEntry(inputs, id, (entry) => ({ ...entry, options: { ...entry.options, ...changed } }));
}

/** Without one recording; the shown one gives way to its neighbour. */
export function withoutRecording(inputs: Inputs, id: string): Inputs {
  const at = inputs.recordings.findIndex((entry) => entry.id === id);
  const recordings = inputs.recordings.filter((entry) => entry.id !== id);
  const neighbour = recordings[Math.min(at, recordings.length - 1)]?.id ?? null;
  return { ...inputs, recordings, selectedId: inputs.selectedId === id ? neighbour : inputs.selectedId };
}

/** Without the demo, once a recording of the person's own is shown. */
export function withoutDemo(inputs: Inputs): Inputs {
  const { [demoSet]: _demo, ...sets } = inputs.sets;
  return { ...inputs, sets, recordings: inputs.recordings.filter((entry) => entry.setId !== demoSet) };
}
