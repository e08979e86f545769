/**
 * What a host gives the page, and all it gives: one way to call a service and one stream of news.
 * Kept free of imports so that the preload script stays a few lines.
 */
export interface HostBridge {
  /** Answers with a Reply (plain JSON); the page parses it again, so a host is not trusted on its word. */
  call(name: string, input: unknown): Promise<unknown>;
  /** Calls `listener` for each piece of news; returns the function that stops it. */
  on(listener: (news: unknown) => void): () => void;
}

/** Name under which the preload script puts the bridge on the page's window. */
export const bridgeName = 'lampwrightHost';

/** The one channel that the window may invoke, and the one on which news come back. */
export const callChannel = 'lampwright:call';
export const newsChannel = 'lampwright:news';

/** Paths of the loopback host. */
export const callPath = '/call/';
export const newsPath = '/news';
