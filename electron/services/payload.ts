import type { FilePayload, SentFile } from '../../shared-core/contract/service-table.ts';
import type { InputFile } from '../../shared-core/result/input-file.ts';
import { fail, ok, type Result } from '../../shared-core/result/result.ts';
import { inputFileOf, unreadable } from './read-input-file.ts';

/** A file on the wire back into bytes. Node skips characters that are no base64, so the way back is compared. */
export function fileFromPayload(payload: FilePayload, subject: string): Result<InputFile> {
  const bytes = Buffer.from(payload.bytesBase64, 'base64');
  if (bytes.toString('base64') !== payload.bytesBase64) {
    return fail(unreadable(subject, payload.name, 'bytes that were damaged on the way'));
  }
  return ok(inputFileOf(payload.name, new Uint8Array(bytes)));
}

export function payloadOfFile(file: InputFile): SentFile {
  return { name: file.name, bytesBase64: Buffer.from(file.bytes).toString('base64'), sha256: file.sha256 };
}
