import type { Protocol } from 'electron';
import { pageHeaders } from '../services/content-policy.ts';
import { readPageFile } from '../services/page-files.ts';

/** The page has an origin of its own instead of file://, which would share one with every file on the disk. */
export const pageScheme = 'app';
export const pageOrigin = `${pageScheme}://lampwright`;

/** Serves the page's folder, and nothing outside it, under `app://lampwright/`. */
export function servePage(protocol: Protocol, pageFolder: string): void {
  protocol.handle(pageScheme, (request) => answerPage(pageFolder, request));
}

export async function answerPage(
  pageFolder: string,
  request: { readonly method: string; readonly url: string },
): Promise<Response> {
  const url = new URL(request.url);
  if (request.method !== 'GET' || url.host !== 'lampwright') return new Response(null, { status: 403 });
  const file = await readPageFile(pageFolder, url.pathname);
  if (file === null) return new Response(null, { status: 404, headers: pageHeaders });
  return new Response(Buffer.from(file.bytes), {
    status: 200,
    headers: { ...pageHeaders, 'Content-Type': file.contentType },
  });
}
