import type { Writable } from 'node:stream';

/** Where a command writes; the tests give it memory instead of the terminal. */
export interface Output {
  /** Resolves when the text has been handed over, so that results appear as they are done. */
  print(text: string): Promise<void>;
  /** One line on standard error. */
  complain(line: string): void;
}

/** Thrown by `print` when the reader has gone, as `lampwright ... | head` does; no fault of anybody. */
export class ReaderGone extends Error {}

export function outputTo(standardOut: Writable, standardError: Writable): Output {
  let isReaderGone = false;
  // Without a listener a closed pipe would end the process with a stack trace.
  const onError = (error: Error): void => {
    if ('code' in error && (error.code === 'EPIPE' || error.code === 'ERR_STREAM_DESTROYED'))
      isReaderGone = true;
    else throw error;
  };
  standardOut.on('error', onError);
  standardError.on('error', () => undefined);
  return {
    print(text) {
      return new Promise((resolve, reject) => {
        if (isReaderGone) {
          reject(new ReaderGone());
          return;
        }
        standardOut.write(text, (error) => {
          if (error) reject(new ReaderGone());
          else resolve();
        });
      });
    },
    complain(line) {
      standardError.write(`${line}\n`);
    },
  };
}
