import type { Dispatch } from 'react';
import type { InputFile } from '../../shared-core/result/input-file.ts';
import { notRecognised, parseSaved } from '../../shared-core/saved/saved-diagnosis.ts';
import { readFile, sha256Hex } from '../client/files.ts';
import { guessRoles } from './file-roles.ts';
import type { Role } from './inputs.ts';
import type { SheetAction } from './sheet-state.ts';

/** Files that were chosen or dropped: read, hashed, given their roles, and handed to the sheet. */
export async function takeFiles(
  files: readonly File[],
  dispatch: Dispatch<SheetAction>,
  role: Role | null = null,
): Promise<void> {
  const readable: InputFile[] = [];
  for (const file of files) {
    const read = await readFile(file);
    if (read.ok) readable.push(read.value);
    else dispatch({ type: 'problem-met', problem: read.problem });
  }
  const plain: { file: InputFile; role: Role }[] = [];
  for (const guessed of guessRoles(readable)) {
    if (guessed.role === 'saved') await openSaved(guessed.file, dispatch);
    else plain.push({ file: guessed.file, role: role ?? guessed.role });
  }
  if (plain.length > 0) dispatch({ type: 'files-added', files: plain });
}

/** A saved diagnosis is taken only whole: each file in it must still have the hash that it states. */
async function openSaved(file: InputFile, dispatch: Dispatch<SheetAction>): Promise<void> {
  const saved = parseSaved(new TextDecoder().decode(file.bytes), file.name);
  if (!saved.ok) {
    dispatch({ type: 'problem-met', problem: saved.problem });
    return;
  }
  const { recording, options, diagnosis, ...slots } = saved.value;
  for (const part of [recording, ...Object.values(slots)]) {
    if (part === null || (await sha256Hex(part.bytes)) === part.sha256) continue;
    const found = `a file "${part.name}" in it that was changed after it was saved (its SHA-256 differs)`;
    dispatch({ type: 'problem-met', problem: notRecognised(file.name, found) });
    return;
  }
  dispatch({
    type: 'saved-opened',
    fileName: file.name,
    recording,
    slots,
    options,
    diagnosis,
  });
}
