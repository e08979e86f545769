import { run } from '../../electron/command-line/run.ts';

export interface Ran {
  readonly status: number;
  readonly out: string;
  readonly error: string;
  /** Lines on standard error. */
  readonly errorLines: readonly string[];
}

/** Runs the command in this process, with memory for a terminal. */
export async function lampwright(...words: readonly string[]): Promise<Ran> {
  let out = '';
  let error = '';
  const status = await run(words, {
    print: (text) => {
      out += text;
      return Promise.resolve();
    },
    complain: (line) => void (error += `${line}\n`),
  });
  return { status, out, error, errorLines: error.split('\n').filter((line) => line !== '') };
}
