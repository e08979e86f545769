import { spawnSync } from 'node:child_process';
import { accessSync, constants } from 'node:fs';
import { delimiter, join } from 'node:path';

const names = [
  'chromium',
  'chromium-browser',
  'google-chrome',
  'google-chrome-stable',
  'microsoft-edge',
  'microsoft-edge-stable',
  'msedge',
  'brave-browser',
  'brave',
];

/** Where installers put browsers on systems that do not list them in PATH. */
const places: Partial<Record<NodeJS.Platform, readonly string[]>> = {
  darwin: [
    '/Applications/Chromium.app/Contents/MacOS/Chromium',
    '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
    '/Applications/Microsoft Edge.app/Contents/MacOS/Microsoft Edge',
    '/Applications/Brave Browser.app/Contents/MacOS/Brave Browser',
  ],
  win32: [
    'C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe',
    'C:\\Program Files (x86)\\Google\\Chrome\\Application\\chrome.exe',
    'C:\\Program Files (x86)\\Microsoft\\Edge\\Application\\msedge.exe',
    'C:\\Program Files\\BraveSoftware\\Brave-Browser\\Application\\brave.exe',
  ],
};

/**
 * Path of a Chromium-family browser, or null: LAMPWRIGHT_CHROMIUM if set, else the first on PATH, else where
 * installers put them.
 */
export function findChromium(
  environment: Readonly<Record<string, string | undefined>> = process.env,
  platform: NodeJS.Platform = process.platform,
): string | null {
  const named = environment['LAMPWRIGHT_CHROMIUM'];
  if (named !== undefined && named !== '') return isProgram(named) ? named : null;
  const folders = (environment['PATH'] ?? '').split(delimiter).filter((folder) => folder !== '');
  const onPath = names.flatMap((name) => folders.map((folder) => join(folder, name)));
  return [...onPath, ...(places[platform] ?? [])].find(isProgram) ?? null;
}

/** The browser for the end-to-end tests; installs Debian's where that is possible, else throws one line. */
export function requireChromium(): string {
  const found = findChromium();
  if (found !== null) return found;
  if (process.env['LAMPWRIGHT_CHROMIUM']) {
    throw new Error(`LAMPWRIGHT_CHROMIUM names no program: ${process.env['LAMPWRIGHT_CHROMIUM']}`);
  }
  if (canInstall()) {
    install();
    const installed = findChromium();
    if (installed !== null) return installed;
  }
  throw new Error(
    'The end-to-end tests need a Chromium-family browser: install chromium (Debian: apt-get install chromium), or set LAMPWRIGHT_CHROMIUM to its path.',
  );
}

const isRoot = (): boolean => process.getuid?.() === 0;

const canInstall = (): boolean =>
  process.platform === 'linux' && isRoot() && spawnSync('apt-get', ['--version']).status === 0;

function install(): void {
  process.stderr.write("Installing Debian's chromium for the end-to-end tests ...\n");
  const apt = (...args: string[]): void => {
    spawnSync('apt-get', ['-o', 'DPkg::Lock::Timeout=120', ...args], {
      stdio: ['ignore', 'ignore', 'inherit'],
      env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    });
  };
  apt('update');
  apt('install', '-y', '--no-install-recommends', 'chromium');
}

function isProgram(path: string): boolean {
  try {
    accessSync(path, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}
