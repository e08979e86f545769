import type { z } from '../schema/zod.ts';
import type { HostBridge } from './bridge.ts';
import { type News, newsSchema } from './news.ts';
import { parseReply, type Reply } from './reply.ts';
import { type InputOf, type OutputOf, type ServiceName, serviceTable } from './service-table.ts';

/** Typed calls over any transport; the same for both hosts and for the tests. */
export interface Client {
  call<N extends ServiceName>(name: N, input: InputOf<N>): Promise<Reply<OutputOf<N>>>;
  onNews(listener: (news: News) => void): () => void;
}

export function createClient(bridge: HostBridge): Client {
  return {
    async call(name, input) {
      const output = serviceTable[name].output as unknown as z.ZodType<OutputOf<typeof name>>;
      return parseReply(await bridge.call(name, input), output);
    },
    onNews: (listener) => bridge.on((raw) => listener(newsSchema.parse(raw))),
  };
}
