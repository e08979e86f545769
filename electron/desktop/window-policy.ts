import type { Session, WebContents } from 'electron';

/** The page never leaves itself: no navigation, no second window, no embedded browser. */
export function lockNavigation(contents: WebContents): void {
  const refuse = (event: { preventDefault(): void }): void => event.preventDefault();
  contents.on('will-navigate', refuse);
  contents.on('will-redirect', refuse);
  contents.on('will-attach-webview', refuse);
  contents.setWindowOpenHandler(() => ({ action: 'deny' }));
}

/** Putting text on the clipboard, never reading it: what copying a table needs, and browsers grant as well. */
const granted = 'clipboard-sanitized-write';

/** No camera, no location, no notifications, no device: the app needs none of them. */
export function denyPermissions(session: Session): void {
  session.setPermissionRequestHandler((_contents, permission, answer) => answer(permission === granted));
  session.setPermissionCheckHandler((_contents, permission) => permission === granted);
  session.setDevicePermissionHandler(() => false);
}
