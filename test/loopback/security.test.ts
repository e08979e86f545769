import { request as httpRequest } from 'node:http';
import { mkdtempSync, mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { startLoopback, type LoopbackHost } from '../../electron/loopback/http-host.ts';
import type { Host } from '../../electron/services/host.ts';
import { createNewsBus } from '../../electron/services/news-bus.ts';
import { maxCallBytes } from '../../shared-core/contract/limits.ts';
import { enterLoopback, type LoopbackSession, readEvents } from '../support/loopback-bridge.ts';

let folder: string;
let loopback: LoopbackHost;
let session: LoopbackSession;
const calls: string[] = [];
const news = createNewsBus('0.1.0');
const host: Host = {
  answer: (name) => {
    calls.push(name);
    return Promise.resolve({ ok: true, value: 'answered' });
  },
  news,
  close: () => Promise.resolve(),
};

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'lampwright-page-'));
  mkdirSync(join(folder, 'page'));
  writeFileSync(join(folder, 'page', 'index.html'), '<!doctype html>');
  writeFileSync(join(folder, 'page', '.hidden.js'), 'hidden');
  writeFileSync(join(folder, 'secret.txt'), 'secret');
  loopback = await startLoopback({ host, pageFolder: join(folder, 'page') });
  session = await enterLoopback(loopback.address);
});
afterAll(async () => {
  session.close();
  await loopback.close();
  rmSync(folder, { recursive: true });
});

interface Sent {
  readonly method?: string;
  readonly path?: string;
  readonly headers?: Record<string, string>;
  readonly body?: string;
}

/** A request with exactly these headers; fetch would correct some of them. */
function send({ method = 'GET', path = '/', headers = {}, body }: Sent): Promise<{
  status: number;
  headers: Record<string, unknown>;
  body: string;
}> {
  return new Promise((resolve, reject) => {
    const request = httpRequest(
      { host: '127.0.0.1', port: loopback.port, method, path, headers },
      (response) => {
        let text = '';
        response.setEncoding('utf8').on('data', (part: string) => (text += part));
        response.on('end', () =>
          resolve({ status: response.statusCode ?? 0, headers: response.headers, body: text }),
        );
      },
    );
    request.on('error', reject);
    request.end(body);
  });
}

const good = (): Record<string, string> => ({
  cookie: session.cookie,
  origin: session.origin,
  'content-type': 'application/json',
});

const call = (changes: Record<string, string | undefined>, body = '{}') => {
  const merged = { ...good(), ...changes };
  const headers = Object.fromEntries(Object.entries(merged).filter(([, value]) => value !== undefined));
  return send({ method: 'POST', path: '/call/app.info', headers: headers as Record<string, string>, body });
};

describe('a call', () => {
  test('is answered when everything is right', async () => {
    const before = calls.length;
    expect((await call({})).status).toBe(200);
    expect(calls.length).toBe(before + 1);
  });

  test.each([
    ['without the cookie', { cookie: undefined }],
    ['with a wrong cookie', { cookie: 'lampwright=AAAA' }],
    ['with the host "localhost"', { host: 'localhost' }],
    ['with a foreign host that points here', { host: 'evil.example' }],
    ['with the host and another port', { host: '127.0.0.1:1' }],
    ['from a foreign origin', { origin: 'http://evil.example' }],
    ['from an origin that begins like ours', { origin: 'http://127.0.0.1.evil.example' }],
    ['from this machine, another port', { origin: 'http://127.0.0.1:1' }],
    ['from a page without origin', { origin: 'null' }],
    ['without any origin', { origin: undefined }],
  ])('is refused with 403 %s, and reaches no service', async (_what, changes) => {
    const before = calls.length;
    expect((await call(changes)).status).toBe(403);
    expect(calls.length).toBe(before);
  });

  test.each([
    ['text/plain', 415],
    ['application/x-www-form-urlencoded', 415],
    ['application/jsonx', 415],
    ['application/json; charset=utf-8', 200],
  ])('with the content type %s is answered with %d', async (contentType, status) => {
    expect((await call({ 'content-type': contentType })).status).toBe(status);
  });

  test.each(['', '{', 'nonsense', '\u0000'])('that is not JSON, %j, is answered with 400', async (body) => {
    expect((await call({}, body)).status).toBe(400);
  });

  test('that states to be too large is refused unread', async () => {
    const answer = await new Promise<number>((resolve, reject) => {
      const request = httpRequest(
        {
          host: '127.0.0.1',
          port: loopback.port,
          method: 'POST',
          path: '/call/app.info',
          headers: { ...good(), 'content-length': String(maxCallBytes + 1) },
        },
        (response) => {
          resolve(response.statusCode ?? 0);
          request.destroy();
        },
      );
      request.on('error', reject);
      request.write('{');
    });
    expect(answer).toBe(413);
  });

  test.each(['GET', 'PUT', 'DELETE', 'OPTIONS'])('by %s is no call', async (method) => {
    const { status } = await send({ method, path: '/call/app.info', headers: good() });
    expect([404, 405]).toContain(status);
  });
});

describe('the first address', () => {
  test.each(['', 'A', 'a'.repeat(43)])('with the token %j is refused', async (token) => {
    expect((await send({ path: `/?t=${token}` })).status).toBe(403);
  });

  test('sets a cookie that scripts and other sites cannot have', async () => {
    const { pathname, search } = new URL(loopback.address);
    const { headers } = await send({ path: pathname + search });
    expect(String(headers['set-cookie'])).toMatch(/; HttpOnly; SameSite=Strict; Path=\/$/);
    expect(headers['location']).toBe('/');
  });

  test('carries 256 bits, other than the cookie', () => {
    const token = new URL(loopback.address).searchParams.get('t') ?? '';
    expect(Buffer.from(token, 'base64url')).toHaveLength(32);
    expect(session.cookie).not.toContain(token);
  });
});

describe('the page', () => {
  test('comes with the strict policy', async () => {
    const { status, headers } = await send({ headers: { cookie: session.cookie } });
    expect(status).toBe(200);
    expect(headers).toMatchObject({
      'x-content-type-options': 'nosniff',
      'cross-origin-opener-policy': 'same-origin',
      'cross-origin-embedder-policy': 'require-corp',
      'cross-origin-resource-policy': 'same-origin',
    });
    const policy = String(headers['content-security-policy']);
    expect(policy).toContain("default-src 'none'");
    expect(policy).not.toMatch(/unsafe|\*|http:/);
    expect(headers['access-control-allow-origin']).toBeUndefined();
  });

  test('is not shown without the cookie', async () => {
    expect((await send({})).status).toBe(403);
  });

  test.each([
    '/../secret.txt',
    '/%2e%2e/secret.txt',
    '/..%2fsecret.txt',
    '/%2e%2e%5csecret.txt',
    '/page/..%2f..%2fsecret.txt',
    '//secret.txt',
    '/.hidden.js',
    '/%00index.html',
    '/%',
    '/C:/secret.txt',
  ])('keeps to its folder: %s', async (path) => {
    const { status, body } = await send({ path, headers: { cookie: session.cookie } });
    expect(status).toBe(404);
    expect(body).toBe('');
  });
});

describe('news', () => {
  test('are not told without the cookie', async () => {
    expect((await send({ path: '/news' })).status).toBe(403);
  });

  test('that were missed are told again to a page that reconnects', async () => {
    for (const recordingName of ['a', 'b', 'c'])
      news.publish({ kind: 'work', state: 'started', recordingName });
    const heard: unknown[] = [];
    const stop = new AbortController();
    await readEvents(`${session.origin}/news`, session.cookie, 1, stop.signal, (piece) => {
      heard.push(piece);
      if (heard.length === 3) stop.abort();
    });
    expect(heard).toMatchObject([{ kind: 'connected' }, { recordingName: 'b' }, { recordingName: 'c' }]);
  });
});

test('listens on this machine only', async () => {
  await expect(fetch(`http://[::1]:${String(loopback.port)}/`)).rejects.toThrow('fetch failed');
});
