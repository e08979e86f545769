import type { IncomingMessage } from 'node:http';

/** The body of a request, or null when it is larger than `maxBytes`; what goes beyond is not kept. */
export function readBody(request: IncomingMessage, maxBytes: number): Promise<Uint8Array | null> {
  const stated = Number(request.headers['content-length'] ?? 0);
  if (stated > maxBytes) return Promise.resolve(null);
  return new Promise((resolve, reject) => {
    const parts: Buffer[] = [];
    let size = 0;
    request.on('data', (part: Buffer) => {
      size += part.length;
      if (size > maxBytes) {
        request.pause();
        resolve(null);
      } else parts.push(part);
    });
    request.on('end', () => resolve(Buffer.concat(parts)));
    request.on('error', reject);
  });
}
