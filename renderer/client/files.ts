import { maxFileBytes } from '../../shared-core/contract/limits.ts';
import type { SentFile } from '../../shared-core/contract/service-table.ts';
import type { InputFile } from '../../shared-core/result/input-file.ts';
import { fail, ok, type Problem, type Result } from '../../shared-core/result/result.ts';
import { decodeBase64 } from '../../shared-core/saved/base64.ts';

/** Reads a file that was chosen or dropped; a size that no recording has is refused before it is read. */
export async function readFile(file: File): Promise<Result<InputFile>> {
  if (file.size > maxFileBytes) return fail(tooLarge(file));
  try {
    const bytes = new Uint8Array(await file.arrayBuffer());
    return ok({ name: file.name, bytes, sha256: await sha256Hex(bytes) });
  } catch {
    return fail(unreadable(file.name));
  }
}

/** Lower-case hex SHA-256. */
export async function sha256Hex(bytes: Uint8Array): Promise<string> {
  const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', bytes as Uint8Array<ArrayBuffer>));
  return [...digest].map((byte) => byte.toString(16).padStart(2, '0')).join('');
}

/** A file that the host sent, back into bytes; null when it was damaged on the way. */
export async function fromSent(sent: SentFile): Promise<InputFile | null> {
  const bytes = decodeBase64(sent.bytesBase64);
  if (bytes === null || (await sha256Hex(bytes)) !== sent.sha256) return null;
  return { name: sent.name, bytes, sha256: sent.sha256 };
}

/** Hands a text to the person as a file, through the host's own way of saving. */
export function saveText(fileName: string, mediaType: string, text: string): void {
  const address = URL.createObjectURL(new Blob([text], { type: mediaType }));
  const link = document.createElement('a');
  link.href = address;
  link.download = fileName;
  link.click();
  // The download has taken its copy by the next turn of the loop; a second leaves room for slow disks.
  setTimeout(() => URL.revokeObjectURL(address), 1_000);
}

const mebibytes = (bytes: number): string => `${String(Math.ceil(bytes / 1024 / 1024))} MiB`;

const tooLarge = (file: File): Problem => ({
  code: 'file.too-large',
  fileName: file.name,
  lineNumber: null,
  subject: 'file',
  expected: `at most ${mebibytes(maxFileBytes)}`,
  found: mebibytes(file.size),
  remedy: 'Export the one spectrum you need as text; everything else stays as it is.',
});

const unreadable = (name: string): Problem => ({
  code: 'file.unreadable',
  fileName: name,
  lineNumber: null,
  subject: 'file',
  expected: 'a file that can be read',
  found: 'a folder, or a file that another program holds or has moved',
  remedy: 'Add the files themselves, and check that they are still where they were.',
});
