import type { Session, WebContents } from 'electron';

/** The page never leaves itself: no navigation, no second window, no embedded browser. */
export function lockNavigation(contents: WebContents): void {
  const refuse = (event: { preventDefault(): void }): void => event.preventDefault();
  contents.on('will-navigate', refuse);
  contents.on('will-redirect', refuse);
  contents.on('will-attach-webview', refuse);
  contents.setWindowOpenHandler(() => ({ action: 'deny' }));
}

/** No camera, no location, no notifications, no device: the app needs none of them. */
export function denyPermissions(session: Session): void {
  session.setPermissionRequestHandler((_contents, _permission, answer) => answer(false));
  session.setPermissionCheckHandler(() => false);
  session.setDevicePermissionHandler(() => false);
}
