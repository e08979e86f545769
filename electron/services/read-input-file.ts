import { createHash } from 'node:crypto';
import { type FileHandle, open, stat } from 'node:fs/promises';
import { basename } from 'node:path';
import { maxFileBytes } from '../../shared-core/contract/limits.ts';
import type { InputFile } from '../../shared-core/result/input-file.ts';
import { fail, ok, type Problem, type Result } from '../../shared-core/result/result.ts';

/**
 * Reads a whole input file, after asking for its size: a file over the limit is refused unread.
 * `shownName` is the name in problems and in the diagnosis; by default the last part of the path.
 */
export async function readInputFile(
  path: string,
  subject: string,
  shownName: string = basename(path),
): Promise<Result<InputFile>> {
  let handle: FileHandle | null = null;
  try {
    // Asked before opening: opening a pipe would wait for somebody to write into it.
    const before = await stat(path);
    if (!before.isFile()) {
      return fail(unreadable(subject, shownName, before.isDirectory() ? 'a folder' : 'a device or pipe'));
    }
    if (before.size > maxFileBytes) return fail(tooLarge(subject, shownName, before.size));
    handle = await open(path, 'r');
    const bytes = await readAtMost(handle, (await handle.stat()).size);
    return ok(inputFileOf(shownName, bytes));
  } catch (error) {
    return fail(unreadable(subject, shownName, systemReason(error)));
  } finally {
    await handle?.close();
  }
}

/** Names bytes and hashes them. */
export function inputFileOf(name: string, bytes: Uint8Array): InputFile {
  return { name, bytes, sha256: createHash('sha256').update(bytes).digest('hex') };
}

/** A file that grows while it is read is taken as long as it was when it was opened, and never over the limit. */
async function readAtMost(handle: FileHandle, size: number): Promise<Uint8Array> {
  const bytes = new Uint8Array(Math.min(size, maxFileBytes));
  let filled = 0;
  while (filled < bytes.length) {
    const { bytesRead } = await handle.read(bytes, filled, bytes.length - filled, filled);
    if (bytesRead === 0) break;
    filled += bytesRead;
  }
  return bytes.subarray(0, filled);
}

export function unreadable(subject: string, fileName: string, found: string): Problem {
  return {
    code: 'file.unreadable',
    fileName,
    lineNumber: null,
    subject,
    expected: 'a file that can be read',
    found,
    remedy: 'Check the path and the permissions.',
  };
}

export function tooLarge(subject: string, fileName: string, size: number): Problem {
  const inMebibytes = (bytes: number): string => `${(bytes / 1024 / 1024).toFixed(0)} MiB`;
  return {
    code: 'file.too-large',
    fileName,
    lineNumber: null,
    subject,
    expected: `at most ${inMebibytes(maxFileBytes)}`,
    found: `${inMebibytes(size)}, which was not read`,
    remedy: 'Export one spectrum a file, or average before exporting.',
  };
}

/** The system's reason in words, without the path that Node repeats in it. */
export function systemReason(error: unknown): string {
  const code = error instanceof Error && 'code' in error ? String(error.code) : '';
  const words: Record<string, string> = {
    ENOENT: 'no such file',
    EACCES: 'no permission',
    EPERM: 'no permission',
    EISDIR: 'a folder',
    ENOTDIR: 'a path through something that is no folder',
    ENOSPC: 'no space left on the disk',
    EROFS: 'a disk that cannot be written',
    EMFILE: 'too many open files',
    EIO: 'a disk fault',
    ENAMETOOLONG: 'a name that is too long',
  };
  return words[code] ?? (code === '' ? 'an unknown fault' : `system fault ${code}`);
}
