import type { Handlers } from '../../shared-core/contract/dispatch.ts';
import { maxFileBytes } from '../../shared-core/contract/limits.ts';
import { ok } from '../../shared-core/result/result.ts';
import type { Compute } from './compute.ts';
import { openDemo } from './demo.ts';
import { readLineTableText } from './line-table.ts';
import type { NewsBus } from './news-bus.ts';

export interface HandlerDeps {
  readonly compute: Compute;
  readonly news: NewsBus;
  readonly version: string;
}

/** One handler a row of the service table. */
export function createHandlers({ compute, news, version }: HandlerDeps): Handlers {
  return {
    'app.info': () => Promise.resolve(ok({ name: 'lampwright' as const, version, maxFileBytes })),

    'demo.open': () => openDemo(),

    'lines.table': async () => {
      const text = await readLineTableText();
      return text.ok ? ok({ csv: text.value }) : text;
    },

    'diagnosis.run': async (job, signal) => {
      const tell = (state: 'started' | 'done' | 'failed'): void =>
        news.publish({ kind: 'work', state, recordingName: job.recording.name });
      tell('started');
      try {
        const answer = await compute.diagnose(job, signal);
        tell(answer.ok ? 'done' : 'failed');
        return answer;
      } catch (error) {
        tell('failed');
        throw error;
      }
    },
  } satisfies Handlers;
}
