import { app } from 'electron';
import { startDesktop } from './start-desktop.ts';

// No await at the top level: the window system is ready only after this file has been evaluated.
startDesktop().catch((error: unknown) => {
  process.stderr.write(
    `Lampwright could not start: ${error instanceof Error ? error.message : String(error)}\n`,
  );
  app.exit(1);
});
