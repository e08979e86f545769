import type { IncomingMessage, ServerResponse } from 'node:http';
import { pageHeaders } from '../services/content-policy.ts';
import type { NewsBus } from '../services/news-bus.ts';

/** Often enough that nothing between browser and host thinks the line dead. */
const keepAliveMs = 20_000;

/**
 * News as server-sent events. The browser reconnects by itself and then states the last number it saw,
 * so it gets what it missed.
 */
export function openNewsStream(request: IncomingMessage, response: ServerResponse, bus: NewsBus): void {
  response.writeHead(200, { ...pageHeaders, 'Content-Type': 'text/event-stream' });
  const lastSeen = lastEventId(request);
  const stop = bus.subscribe(lastSeen, (news) => {
    response.write(`id: ${String(news.sequence)}\ndata: ${JSON.stringify(news)}\n\n`);
  });
  const keepAlive = setInterval(() => void response.write(': still here\n\n'), keepAliveMs);
  response.on('close', () => {
    clearInterval(keepAlive);
    stop();
  });
}

function lastEventId(request: IncomingMessage): number | null {
  const header = request.headers['last-event-id'];
  return typeof header === 'string' && /^\d{1,15}$/.test(header) ? Number(header) : null;
}
