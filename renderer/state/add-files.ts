import { defaultAnalysisOptions } from '../../shared-core/diagnosis/analysis-options.ts';
import type { InputFile } from '../../shared-core/result/input-file.ts';
import { changed } from './history.ts';
import {
  entryOf,
  type Inputs,
  joinedSet,
  keyOf,
  type RecordingEntry,
  type Role,
  roleNames,
  type SlotRole,
  slotRoles,
  withSlot,
} from './inputs.ts';
import type { Outcome, SheetAction, SheetState } from './sheet-state.ts';

/**
 * Files come in, each with its role. The screen keeps showing what it shows until one of the new recordings
 * has been diagnosed; a lone dark, response or bench is on trial until the shown recording accepts it.
 */
export function filesAdded(
  state: SheetState,
  files: readonly { readonly file: InputFile; readonly role: Role }[],
  before: Inputs = state.inputs,
): SheetState {
  const setId = joinedSet(before);
  let inputs = before;
  let nextId = state.nextId;
  const known = new Set(inputs.recordings.filter((entry) => entry.setId === setId).map(identity));
  const added: RecordingEntry[] = [];
  let lastSlot: { role: SlotRole; fileName: string } | null = null;
  for (const { file, role } of files) {
    if (role === 'recording') {
      if (known.has(identity({ file }))) continue;
      known.add(identity({ file }));
      added.push({ id: `r${String(nextId)}`, file, setId, options: defaultAnalysisOptions });
      nextId += 1;
    } else {
      inputs = withSlot(inputs, setId, role, file);
      lastSlot = { role, fileName: file.name };
    }
  }
  if (added.length === 0 && lastSlot === null) return { ...state, lastDone: 'Already in the tray' };
  inputs = { ...inputs, recordings: [...inputs.recordings, ...added] };
  if (inputs.selectedId === null) inputs = { ...inputs, selectedId: added[0]?.id ?? null };
  const next = changed({ ...state, nextId }, inputs, labelFor(files));
  const shown = entryOf(inputs, inputs.selectedId);
  const isTried = added.length === 0 && shown?.setId === setId;
  const onTrial = isTried && lastSlot !== null ? { ...lastSlot, key: keyOf(inputs, shown) } : null;
  const awaited = added.map((entry) => keyOf(inputs, entry));
  return {
    ...next,
    toShow: added.map((entry) => entry.id),
    onTrial,
    outcomes: without(state.outcomes, onTrial === null ? awaited : [...awaited, onTrial.key]),
  };
}

/** What is waited for is computed afresh, so that its coming in can be answered: shown, refused or compared. */
function without(
  outcomes: ReadonlyMap<string, Outcome>,
  keys: readonly string[],
): ReadonlyMap<string, Outcome> {
  return new Map([...outcomes].filter(([key]) => !keys.includes(key)));
}

const identity = (entry: { readonly file: InputFile }): string => `${entry.file.sha256} ${entry.file.name}`;

function labelFor(files: readonly { readonly file: InputFile; readonly role: Role }[]): string {
  const [first] = files;
  if (files.length === 1 && first !== undefined)
    return `Added ${first.file.name} as ${roleNames[first.role]}`;
  const count = (role: Role): number => files.filter((file) => file.role === role).length;
  const recordings = count('recording');
  const parts =
    recordings === 0 ? [] : [recordings === 1 ? '1 recording' : `${String(recordings)} recordings`];
  for (const role of slotRoles) {
    if (count(role) > 0) parts.push(roleNames[role]);
  }
  return `Added ${parts.join(', ')}`;
}

/** A saved diagnosis brings its own set of files, so it never mixes with what is open. */
export function savedOpened(
  state: SheetState,
  saved: Extract<SheetAction, { type: 'saved-opened' }>,
): SheetState {
  const id = `r${String(state.nextId)}`;
  const setId = `saved-${String(state.nextId)}`;
  const entry: RecordingEntry = { id, file: saved.recording, setId, options: saved.options };
  const inputs: Inputs = {
    recordings: [...state.inputs.recordings, entry],
    sets: { ...state.inputs.sets, [setId]: saved.slots },
    selectedId: state.inputs.selectedId ?? id,
  };
  const next = changed({ ...state, nextId: state.nextId + 1 }, inputs, `Reopened ${saved.fileName}`);
  return {
    ...next,
    toShow: [id],
    outcomes: without(state.outcomes, [keyOf(inputs, entry)]),
    reopened: { recordingId: id, fileName: saved.fileName, diagnosis: saved.diagnosis },
  };
}
