import { join } from 'node:path';
import { dispatch } from '../../shared-core/contract/dispatch.ts';
import type { Reply } from '../../shared-core/contract/reply.ts';
import { appRoot, programVersion } from './app-root.ts';
import { createCompute } from './compute.ts';
import { createHandlers } from './handlers.ts';
import { createIncidentLog } from './incident-log.ts';
import { createNewsBus, type NewsBus } from './news-bus.ts';

/** What both window hosts stand on: one way to answer a call, one source of news. */
export interface Host {
  answer(name: string, rawInput: unknown): Promise<Reply<unknown>>;
  readonly news: NewsBus;
  close(): Promise<void>;
}

/** Where the build puts the compute worker. */
export const builtWorkerFile = join(appRoot, 'out', 'services', 'compute-worker.cjs');

export function createHost(settings: { readonly logFolder: string; readonly workerFile?: string }): Host {
  const version = programVersion();
  const news = createNewsBus(version);
  const compute = createCompute(settings.workerFile ?? builtWorkerFile);
  const log = createIncidentLog(settings.logFolder);
  const dispatcher = {
    handlers: createHandlers({ compute, news, version }),
    onIncident: (serviceName: string, error: unknown) => log.record(serviceName, error),
    startTimer(timeLimitMs: number, onEnd: () => void) {
      const timer = setTimeout(onEnd, timeLimitMs);
      return () => clearTimeout(timer);
    },
  };
  return {
    answer: (name, rawInput) => dispatch(dispatcher, name, rawInput),
    news,
    close: () => compute.close(),
  };
}
