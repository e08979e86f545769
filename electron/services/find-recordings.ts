import { readdir } from 'node:fs/promises';
import { extname } from 'node:path';

/** Endings under which spectrometers export text tables. */
const recordingExtensions: ReadonlySet<string> = new Set(['.csv', '.txt', '.tsv', '.dat', '.asc']);

/** True for names that hold a recording by their ending; hidden files and files still being written are not. */
export function looksLikeRecording(name: string): boolean {
  return !name.startsWith('.') && recordingExtensions.has(extname(name).toLowerCase());
}

/**
 * Names of the recordings that lie directly in a folder, in the order of their character codes, so that the
 * order is the same on every machine.
 */
export async function findRecordings(folder: string): Promise<string[]> {
  const entries = await readdir(folder, { withFileTypes: true });
  return entries
    .filter((entry) => !entry.isDirectory() && looksLikeRecording(entry.name))
    .map((entry) => entry.name)
    .sort((a, b) => (a < b ? -1 : a > b ? 1 : 0));
}
