import type { Outcome } from '../state/sheet-state.ts';
import { fail } from '../../shared-core/result/result.ts';
import type { DiagnoseRequest, FromWorker, ToWorker, WorkerSetup } from './protocol.ts';

/** One worker with one job at a time. */
export interface DiagnoseRunner {
  /** Answers with the outcome; `onTrials` hears how far a Monte Carlo check has come. */
  run(request: DiagnoseRequest, onTrials: (trials: number) => void): Promise<Outcome>;
  /** Ends the running job; its promise stays open for ever, as nobody waits for it. */
  stop(): void;
}

export function createDiagnoseRunner(setup: WorkerSetup): DiagnoseRunner {
  let worker: Worker | null = null;
  const start = (): Worker => {
    const started = new Worker(new URL('./diagnose-worker.ts', import.meta.url), { type: 'module' });
    started.postMessage({ kind: 'setup', setup } satisfies ToWorker);
    return started;
  };
  return {
    run(request, onTrials) {
      worker ??= start();
      const current = worker;
      return new Promise((resolve) => {
        current.onmessage = ({ data }: MessageEvent<FromWorker>) => {
          if (data.kind === 'trials') onTrials(data.trials);
          else resolve(data.outcome);
        };
        current.onerror = (event) => {
          event.preventDefault();
          worker = null;
          current.terminate();
          resolve(fail(fault(request.recording.name, event.message)));
        };
        current.postMessage({ kind: 'diagnose', request } satisfies ToWorker);
      });
    },
    stop() {
      worker?.terminate();
      worker = null;
    },
  };
}

const fault = (fileName: string, message: string) => ({
  code: 'service.internal' as const,
  fileName,
  lineNumber: null,
  subject: 'recording',
  expected: 'a diagnosis',
  found: `a fault in this program (${message})`,
  remedy: 'Please report it with the recording; everything else stays as it is.',
});
