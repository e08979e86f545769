import { ipcMain, type WebContents, type WebFrameMain } from 'electron';
import { callChannel, newsChannel } from '../../shared-core/contract/bridge.ts';
import { refusal } from '../../shared-core/contract/dispatch.ts';
import { fail } from '../../shared-core/result/result.ts';
import type { Host } from '../services/host.ts';
import type { NewsBus } from '../services/news-bus.ts';
import { pageOrigin } from './app-protocol.ts';

/** The one channel from page to host. Whoever is not our page in a main frame is told so, with a Problem. */
export function serveCalls(host: Host): void {
  ipcMain.handle(callChannel, (event, name: unknown, input: unknown) => {
    if (!isOurPage(event.senderFrame)) {
      return fail(refusal('a call from the window of this program', 'another sender'));
    }
    return host.answer(typeof name === 'string' ? name : '', input);
  });
}

/** Sends news to one window as long as it lives; a page that is loaded anew is connected anew. */
export function sendNews(contents: WebContents, bus: NewsBus): () => void {
  let stop = (): void => undefined;
  contents.on('did-finish-load', () => {
    stop();
    stop = bus.subscribe(null, (news) => {
      if (!contents.isDestroyed()) contents.send(newsChannel, news);
    });
  });
  return () => stop();
}

/** Compared by parsed origin: a name that only begins like ours does not pass. A frame that is gone is null. */
export function isOurPage(frame: Pick<WebFrameMain, 'url' | 'parent'> | null): boolean {
  if (frame === null || frame.parent !== null) return false;
  if (!URL.canParse(frame.url)) return false;
  const url = new URL(frame.url);
  return `${url.protocol}//${url.host}` === pageOrigin;
}
