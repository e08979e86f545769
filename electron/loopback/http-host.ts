import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { callPath, newsPath } from '../../shared-core/contract/bridge.ts';
import { refusal } from '../../shared-core/contract/dispatch.ts';
import { maxCallBytes } from '../../shared-core/contract/limits.ts';
import { fail, type Problem } from '../../shared-core/result/result.ts';
import { pageHeaders } from '../services/content-policy.ts';
import type { Host } from '../services/host.ts';
import { readPageFile } from '../services/page-files.ts';
import { cookieName, hasCookie, isForUs, isFromOurPage, newSecrets, sameSecret } from './http-guard.ts';
import { openNewsStream } from './news-stream.ts';
import { readBody } from './read-body.ts';

export interface LoopbackSettings {
  readonly host: Host;
  /** Folder of the built page. */
  readonly pageFolder: string;
  /** Origin of a development server that serves the page instead; never set in a normal run. */
  readonly developmentOrigin?: string;
  /** 0, the default, takes any free port. */
  readonly port?: number;
}

export interface LoopbackHost {
  /** The address that opens the window, with this run's token in it. */
  readonly address: string;
  readonly port: number;
  close(): Promise<void>;
}

/** The app served to one browser on this machine: on 127.0.0.1, to whoever holds this run's secret. */
export async function startLoopback(settings: LoopbackSettings): Promise<LoopbackHost> {
  const secrets = newSecrets();
  let port = 0;
  const server = createServer((request, response) => {
    serve(request, response, { ...settings, secrets, port }).catch(() => {
      if (!response.headersSent) response.writeHead(500);
      response.end();
    });
  });
  server.headersTimeout = 10_000;
  await listen(server, settings.port ?? 0);
  port = (server.address() as AddressInfo).port;
  return {
    address: `http://127.0.0.1:${String(port)}/?t=${secrets.token}`,
    port,
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve());
        server.closeAllConnections();
      }),
  };
}

function listen(server: Server, port: number): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', () => {
      server.off('error', reject);
      resolve();
    });
  });
}

interface Door extends LoopbackSettings {
  readonly secrets: { readonly token: string; readonly cookie: string };
  readonly port: number;
}

async function serve(request: IncomingMessage, response: ServerResponse, door: Door): Promise<void> {
  const refuse = (status: number): void => void response.writeHead(status, pageHeaders).end();
  if (!isForUs(request, door.port)) return refuse(403);
  const url = urlOf(request, door.port);
  if (url === null) return refuse(404);

  const token = url.searchParams.get('t');
  if (request.method === 'GET' && url.pathname === '/' && token !== null) {
    if (!sameSecret(token, door.secrets.token)) return refuse(403);
    const cookie = `${cookieName(door.port)}=${door.secrets.cookie}; HttpOnly; SameSite=Strict; Path=/`;
    // The redirect takes the token out of the address bar, and so out of the history.
    response
      .writeHead(303, { ...pageHeaders, 'Set-Cookie': cookie, Location: door.developmentOrigin ?? '/' })
      .end();
    return;
  }

  if (!hasCookie(request, door.port, door.secrets.cookie)) return refuse(403);
  if (request.method === 'POST' && url.pathname.startsWith(callPath)) {
    return answerCall(request, response, door, url.pathname.slice(callPath.length));
  }
  if (request.method !== 'GET') return refuse(405);
  if (url.pathname === newsPath) return openNewsStream(request, response, door.host.news);
  const file = await readPageFile(door.pageFolder, url.pathname);
  if (file === null) return refuse(404);
  response.writeHead(200, { ...pageHeaders, 'Content-Type': file.contentType }).end(file.bytes);
}

/** A path only: "//name" and whole addresses would be read as those of another host. */
function urlOf(request: IncomingMessage, port: number): URL | null {
  const path = request.url ?? '';
  if (!path.startsWith('/') || path.startsWith('//')) return null;
  const address = `http://127.0.0.1:${String(port)}${path}`;
  return URL.canParse(address) ? new URL(address) : null;
}

async function answerCall(
  request: IncomingMessage,
  response: ServerResponse,
  door: Door,
  name: string,
): Promise<void> {
  const send = (status: number, reply: unknown): void => {
    const headers = { ...pageHeaders, 'Content-Type': 'application/json; charset=utf-8' };
    response.writeHead(status, headers).end(JSON.stringify(reply));
  };
  const refuse = (status: number, problem: Problem): void => send(status, fail(problem));

  const ownOrigin = `http://127.0.0.1:${String(door.port)}`;
  const origins = door.developmentOrigin === undefined ? [ownOrigin] : [ownOrigin, door.developmentOrigin];
  if (!isFromOurPage(request, origins)) {
    return refuse(403, refusal('a call from the window of this program', 'another sender'));
  }
  const contentType = request.headers['content-type'] ?? '';
  if (!/^application\/json(;|$)/.test(contentType)) {
    return refuse(415, refusal('a call in JSON', contentType === '' ? 'no content type' : contentType));
  }
  const body = await readBody(request, maxCallBytes);
  if (body === null) {
    response.setHeader('Connection', 'close');
    const mebibytes = String(maxCallBytes / 1024 / 1024);
    return refuse(413, refusal(`a call of at most ${mebibytes} MiB`, 'a larger one'));
  }
  const input = parseJson(body);
  if (input === undefined) return refuse(400, refusal('a call in JSON', 'something else'));
  // A Problem is an answer like any other: it comes with 200, so that both hosts look the same to the page.
  send(200, await door.host.answer(name, input));
}

function parseJson(body: Uint8Array): unknown {
  try {
    return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(body));
  } catch {
    return undefined;
  }
}
