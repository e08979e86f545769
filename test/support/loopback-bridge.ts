import { callPath, type HostBridge, newsPath } from '../../shared-core/contract/bridge.ts';
import { cookieName } from '../../electron/loopback/http-guard.ts';

/** The way into a running loopback host that a browser would take: first address, cookie, then calls. */
export interface LoopbackSession {
  readonly origin: string;
  readonly cookie: string;
  readonly bridge: HostBridge;
  close(): void;
}

export async function enterLoopback(address: string): Promise<LoopbackSession> {
  const { origin, port } = new URL(address);
  const first = await fetch(address, { redirect: 'manual' });
  const cookie = (first.headers.get('set-cookie') ?? '').split(';')[0] ?? '';
  if (first.status !== 303 || !cookie.startsWith(`${cookieName(Number(port))}=`)) {
    throw new Error(`the first address answered ${String(first.status)} without the cookie`);
  }
  const ended = new AbortController();
  const bridge: HostBridge = {
    async call(name, input) {
      const response = await fetch(origin + callPath + name, {
        method: 'POST',
        headers: { cookie, origin, 'content-type': 'application/json' },
        body: JSON.stringify(input),
      });
      return (await response.json()) as unknown;
    },
    on(listener) {
      const stop = new AbortController();
      const signal = AbortSignal.any([stop.signal, ended.signal]);
      void readEvents(origin + newsPath, cookie, null, signal, listener);
      return () => stop.abort();
    },
  };
  return { origin, cookie, bridge, close: () => ended.abort() };
}

/** Reads server-sent events until the signal; `lastSeen` is what a browser states when it reconnects. */
export async function readEvents(
  url: string,
  cookie: string,
  lastSeen: number | null,
  signal: AbortSignal,
  listener: (news: unknown) => void,
): Promise<void> {
  const resume: Record<string, string> = lastSeen === null ? {} : { 'last-event-id': String(lastSeen) };
  try {
    const response = await fetch(url, { headers: { cookie, ...resume }, signal });
    if (response.body === null) throw new Error('the news stream has no body');
    let text = '';
    const reader = response.body.pipeThrough(new TextDecoderStream()).getReader();
    for (;;) {
      const { done, value } = await reader.read();
      if (done) return;
      text += value;
      const blocks = text.split('\n\n');
      text = blocks.pop() ?? '';
      for (const block of blocks) {
        const data = /^data: (.*)$/m.exec(block)?.[1];
        if (data !== undefined) listener(JSON.parse(data));
      }
    }
  } catch (error) {
    if (!signal.aborted) throw error;
  }
}
