import { app, BrowserWindow, protocol, session } from 'electron';
import { join } from 'node:path';
import { appRoot } from '../services/app-root.ts';
import { createHost } from '../services/host.ts';
import { pageScheme, servePage } from './app-protocol.ts';
import { serveCalls, sendNews } from './ipc-host.ts';
import { denyPermissions, lockNavigation } from './window-policy.ts';
import { openWindow } from './window.ts';

/** Start-up order matters: the scheme and the sandbox before the app is ready, everything else after. */
export async function startDesktop(): Promise<void> {
  protocol.registerSchemesAsPrivileged([
    { scheme: pageScheme, privileges: { standard: true, secure: true, supportFetchAPI: true } },
  ]);
  app.enableSandbox();
  if (!app.requestSingleInstanceLock()) {
    app.quit();
    return;
  }
  await app.whenReady();

  const host = createHost({ logFolder: app.getPath('userData') });
  denyPermissions(session.defaultSession);
  servePage(protocol, join(appRoot, 'out', 'renderer'));

  const open = (): void => {
    const window = openWindow(join(appRoot, 'out', 'preload', 'preload.cjs'));
    lockNavigation(window.webContents);
    const stopNews = sendNews(window.webContents, host.news);
    window.on('closed', stopNews);
  };
  serveCalls(host);
  open();

  app.on('second-instance', () => {
    const window = BrowserWindow.getAllWindows()[0];
    if (window === undefined) return;
    if (window.isMinimized()) window.restore();
    window.focus();
  });
  app.on('activate', () => {
    if (BrowserWindow.getAllWindows().length === 0) open();
  });
  app.on('window-all-closed', () => {
    if (process.platform !== 'darwin') app.quit();
  });
  app.on('will-quit', () => void host.close());
}
