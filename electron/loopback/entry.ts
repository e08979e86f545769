import { homedir } from 'node:os';
import { join } from 'node:path';
import { appRoot } from '../services/app-root.ts';
import { createHost } from '../services/host.ts';
import { startLoopback } from './http-host.ts';
import { openBrowser } from './open-browser.ts';

/**
 * Starts the browser window's host. `LAMPWRIGHT_OPEN=no` only prints the address;
 * `LAMPWRIGHT_DEV_ORIGIN` is set by the development script alone.
 */
async function start(): Promise<void> {
  const host = createHost({ logFolder: logFolder() });
  const developmentOrigin = process.env['LAMPWRIGHT_DEV_ORIGIN'];
  const loopback = await startLoopback({
    host,
    pageFolder: join(appRoot, 'out', 'renderer'),
    ...(developmentOrigin === undefined ? {} : { developmentOrigin, port: developmentPort() }),
  });
  const end = (): void => {
    void Promise.all([loopback.close(), host.close()]).then(() => process.exit(0));
  };
  process.once('SIGINT', end);
  process.once('SIGTERM', end);

  const isOpen = process.env['LAMPWRIGHT_OPEN'] !== 'no' && (await openBrowser(loopback.address));
  const where = isOpen
    ? 'is open in your browser at'
    : 'is ready; open this address in a browser on this machine:';
  process.stdout.write(`Lampwright ${where} ${loopback.address}\nCtrl-C ends it.\n`);
}

function developmentPort(): number {
  return Number(process.env['LAMPWRIGHT_DEV_PORT'] ?? 0);
}

function logFolder(): string {
  const state = process.env['XDG_STATE_HOME'] ?? join(homedir(), '.local', 'state');
  return join(state, 'lampwright');
}

start().catch((error: unknown) => {
  process.stderr.write(
    `Lampwright could not start: ${error instanceof Error ? error.message : String(error)}\n`,
  );
  process.exitCode = 1;
});
