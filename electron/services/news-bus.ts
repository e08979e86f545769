import type { News } from '../../shared-core/contract/news.ts';

type NumberedNews = Exclude<News, { kind: 'connected' }>;
type Unnumbered<N> = N extends { sequence: number } ? Omit<N, 'sequence'> : never;

/** News kept for a page that was cut off for a moment. */
const keptCount = 256;

export interface NewsBus {
  publish(news: Unnumbered<NumberedNews>): void;
  /**
   * Tells `listener` that it is connected, then everything after number `lastSeen` that is still kept, then
   * all that comes. Null as `lastSeen` means a new page: nothing old. Returns the function that ends it.
   */
  subscribe(lastSeen: number | null, listener: (news: News) => void): () => void;
}

export function createNewsBus(version: string): NewsBus {
  const listeners = new Set<(news: News) => void>();
  const kept: NumberedNews[] = [];
  let sequence = 0;
  return {
    publish(news) {
      sequence += 1;
      const numbered: NumberedNews = { ...news, sequence };
      kept.push(numbered);
      if (kept.length > keptCount) kept.shift();
      for (const listener of listeners) listener(numbered);
    },
    subscribe(lastSeen, listener) {
      listener({ kind: 'connected', sequence, version });
      if (lastSeen !== null) {
        for (const news of kept) if (news.sequence > lastSeen) listener(news);
      }
      listeners.add(listener);
      return () => void listeners.delete(listener);
    },
  };
}
