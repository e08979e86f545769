import { createHash, randomBytes, timingSafeEqual } from 'node:crypto';
import type { IncomingMessage } from 'node:http';

/** Secrets of one run: 256 bits each. The token opens the door once by URL, the cookie keeps it open. */
export interface Secrets {
  readonly token: string;
  readonly cookie: string;
}

export const newSecrets = (): Secrets => ({ token: secret(), cookie: secret() });

const secret = (): string => randomBytes(32).toString('base64url');

/** Cookies are shared between the ports of one machine, so the port is part of the name. */
export const cookieName = (port: number): string => `lampwright-${String(port)}`;

/** Compares without telling by its time how much was right; hashing makes the lengths equal. */
export function sameSecret(given: string, wanted: string): boolean {
  const digest = (text: string): Buffer => createHash('sha256').update(text).digest();
  return timingSafeEqual(digest(given), digest(wanted));
}

/**
 * True when the request was sent to exactly our address. A foreign name that was made to point at this
 * machine (DNS rebinding) shows here, as does "localhost".
 */
export function isForUs(request: IncomingMessage, port: number): boolean {
  return request.headers.host === `127.0.0.1:${String(port)}`;
}

/** True when the page that sends the request is ours. Browsers always state the origin on a POST. */
export function isFromOurPage(request: IncomingMessage, allowedOrigins: readonly string[]): boolean {
  const origin = request.headers.origin;
  return origin !== undefined && allowedOrigins.includes(origin);
}

export function hasCookie(request: IncomingMessage, port: number, wanted: string): boolean {
  const prefix = `${cookieName(port)}=`;
  const cookies = (request.headers.cookie ?? '').split(';').map((cookie) => cookie.trim());
  const ours = cookies.filter((cookie) => cookie.startsWith(prefix));
  return ours.some((cookie) => sameSecret(cookie.slice(prefix.length), wanted));
}
