import { BrowserWindow } from 'electron';
import { pageOrigin } from './app-protocol.ts';

/** The window: sandboxed, isolated from the preload script, without Node. */
export function openWindow(preloadFile: string): BrowserWindow {
  const window = new BrowserWindow({
    width: 1440,
    height: 960,
    minWidth: 800,
    minHeight: 600,
    show: false,
    title: 'Lampwright',
    autoHideMenuBar: true,
    webPreferences: {
      preload: preloadFile,
      sandbox: true,
      contextIsolation: true,
      nodeIntegration: false,
      webviewTag: false,
      spellcheck: false,
    },
  });
  window.once('ready-to-show', () => window.show());
  void window.loadURL(`${pageOrigin}/index.html`);
  return window;
}
