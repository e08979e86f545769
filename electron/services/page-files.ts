import { readFile } from 'node:fs/promises';
import { extname, join, sep } from 'node:path';

const contentTypes: Readonly<Record<string, string>> = {
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.css': 'text/css; charset=utf-8',
  '.svg': 'image/svg+xml',
  '.png': 'image/png',
  '.ttf': 'font/ttf',
  '.woff2': 'font/woff2',
  '.json': 'application/json; charset=utf-8',
  '.txt': 'text/plain; charset=utf-8',
};

export interface PageFile {
  readonly bytes: Uint8Array;
  readonly contentType: string;
}

/**
 * The file of the page at a URL path, or null. A path that leaves the folder, names a hidden file or has an
 * ending that no page needs is answered like one that does not exist.
 */
export async function readPageFile(pageFolder: string, urlPath: string): Promise<PageFile | null> {
  const path = safePath(pageFolder, urlPath);
  if (path === null) return null;
  const contentType = contentTypes[extname(path).toLowerCase()];
  if (contentType === undefined) return null;
  try {
    return { bytes: new Uint8Array(await readFile(path)), contentType };
  } catch {
    return null;
  }
}

/** The file path inside `pageFolder` for a URL path; null when it would lead out of it. */
export function safePath(pageFolder: string, urlPath: string): string | null {
  let decoded: string;
  try {
    decoded = decodeURIComponent(urlPath);
  } catch {
    return null;
  }
  const parts = (decoded === '/' ? '/index.html' : decoded).split('/').slice(1);
  const isPlain = (part: string): boolean => part !== '' && !part.startsWith('.') && !/[\\:\0]/.test(part);
  if (!decoded.startsWith('/') || !parts.every(isPlain)) return null;
  const path = join(pageFolder, ...parts);
  return path.startsWith(pageFolder + sep) ? path : null;
}
