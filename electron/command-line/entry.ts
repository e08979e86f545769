import { outputTo, ReaderGone } from './output.ts';
import { run } from './run.ts';

/** The `lampwright` command on the real terminal; answers the exit status. */
export async function runCommandLine(words: readonly string[]): Promise<number> {
  try {
    return await run(words, outputTo(process.stdout, process.stderr));
  } catch (error) {
    if (error instanceof ReaderGone) return 0;
    throw error;
  }
}
