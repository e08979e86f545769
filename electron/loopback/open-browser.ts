import { spawn } from 'node:child_process';

/**
 * Opens an address in the person's own browser. False when that is not possible: no screen, or no opener.
 */
export function openBrowser(address: string): Promise<boolean> {
  const opener = openerFor(process.platform, process.env);
  if (opener === null) return Promise.resolve(false);
  return new Promise((resolve) => {
    const child = spawn(opener.command, [...opener.args, address], { stdio: 'ignore', detached: true });
    child.once('error', () => resolve(false));
    child.once('exit', (status) => resolve(status === 0));
    // Some openers stay as long as the browser does: no bad news for a while is good news.
    setTimeout(() => resolve(true), 3_000).unref();
    child.unref();
  });
}

interface Opener {
  readonly command: string;
  readonly args: readonly string[];
}

export function openerFor(
  platform: NodeJS.Platform,
  environment: Readonly<Record<string, string | undefined>>,
): Opener | null {
  if (platform === 'darwin') return { command: 'open', args: [] };
  // Through rundll32, as "start" belongs to a shell, which would read the address for commands.
  if (platform === 'win32') return { command: 'rundll32', args: ['url.dll,FileProtocolHandler'] };
  const hasScreen = Boolean(environment['DISPLAY']) || Boolean(environment['WAYLAND_DISPLAY']);
  return hasScreen ? { command: 'xdg-open', args: [] } : null;
}
