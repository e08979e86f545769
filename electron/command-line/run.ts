import { programVersion } from '../services/app-root.ts';
import { diagnoseCommand } from './diagnose-command.ts';
import type { ExitStatus } from './exit-status.ts';
import { generalHelp } from './help.ts';
import { linesCommand } from './lines-command.ts';
import type { Output } from './output.ts';
import { simulateCommand } from './simulate-command.ts';
import { UsageFault } from './usage.ts';

type Command = (words: readonly string[], output: Output) => Promise<ExitStatus>;

const commands: Readonly<Record<string, Command>> = {
  diagnose: diagnoseCommand,
  simulate: simulateCommand,
  lines: linesCommand,
};

export async function run(words: readonly string[], output: Output): Promise<ExitStatus> {
  try {
    return await choose(words, output);
  } catch (error) {
    if (!(error instanceof UsageFault)) throw error;
    output.complain(`lampwright: ${error.message} "lampwright --help" shows the usage.`);
    return 2;
  }
}

async function choose(words: readonly string[], output: Output): Promise<ExitStatus> {
  const [first, ...rest] = words;
  if (first === undefined) throw new UsageFault('no command given.');
  const isAlone = rest.length === 0;
  if ((first === '--help' || first === '-h' || first === 'help') && isAlone) {
    await output.print(generalHelp);
    return 0;
  }
  if (first === '--version' && isAlone) {
    await output.print(`lampwright ${programVersion()}\n`);
    return 0;
  }
  const command = Object.hasOwn(commands, first) ? commands[first] : undefined;
  if (command === undefined) throw new UsageFault(`there is no command "${first}".`);
  if (rest.includes('--help')) {
    await output.print(generalHelp);
    return 0;
  }
  return command(rest, output);
}
