/**
 * Where Electron begins. The packaged program is two doors in one: with a command it is the command line,
 * else it opens the window. Doors do not import each other; they meet only here.
 */
const { join } = require('node:path');

const out = join(__dirname, '..', '..', 'out');
const commands = ['diagnose', 'simulate', 'lines', '--help', '--version'];

/** @param {readonly string[]} argv as Electron got it: a checkout has the app's folder at index 1 */
function wordsOf(argv) {
  return process.defaultApp ? argv.slice(2) : argv.slice(1);
}

const words = wordsOf(process.argv);
if (words[0] !== undefined && commands.includes(words[0])) {
  const { app } = require('electron');
  const { runCommandLine } = require(join(out, 'command-line', 'entry.cjs'));
  runCommandLine(words).then((/** @type {number} */ status) => app.exit(status));
} else {
  require(join(out, 'desktop', 'entry.cjs'));
}
