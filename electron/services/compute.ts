import { Worker } from 'node:worker_threads';
import type { CancelSignal } from '../../shared-core/contract/dispatch.ts';
import type { WorkerMessage } from './compute-worker.ts';
import type { DiagnosisAnswer, DiagnosisJob } from './run-diagnosis.ts';

export interface Compute {
  /** Answers jobs in the order they came. A cancelled job ends its worker; the next job gets a new one. */
  diagnose(job: DiagnosisJob, signal: CancelSignal): Promise<DiagnosisAnswer>;
  close(): Promise<void>;
}

/** One worker thread, started with the first job, so that a long computation never blocks a window's host. */
export function createCompute(workerFile: string): Compute {
  let worker: Worker | null = null;
  let lastJob: Promise<unknown> = Promise.resolve();

  const end = async (): Promise<void> => {
    const old = worker;
    worker = null;
    await old?.terminate();
  };

  const run = (job: DiagnosisJob, signal: CancelSignal): Promise<DiagnosisAnswer> => {
    worker ??= new Worker(workerFile);
    const current = worker;
    return new Promise<DiagnosisAnswer>((resolve, reject) => {
      const onMessage = (message: WorkerMessage): void => {
        stopListening();
        if (message.kind === 'answer') resolve(message.answer);
        else reject(new Error(message.detail));
      };
      const onBroken = (error: Error): void => {
        stopListening();
        if (worker === current) worker = null;
        reject(error);
      };
      const onExit = (): void => onBroken(new Error('the compute worker ended before it answered'));
      // One by one: the thread keeps listeners of its own, which must stay.
      const stopListening = (): void => {
        current.off('message', onMessage);
        current.off('error', onBroken);
        current.off('exit', onExit);
      };
      current.on('message', onMessage);
      current.on('error', onBroken);
      current.on('exit', onExit);
      signal.onCancel(() => void current.terminate());
      current.postMessage(job);
    });
  };

  return {
    diagnose(job, signal) {
      let isCancelled = false;
      signal.onCancel(() => {
        isCancelled = true;
      });
      const answer = lastJob.then(() => {
        if (isCancelled) throw new Error('cancelled before it began');
        return run(job, signal);
      });
      lastJob = answer.catch(() => undefined);
      return answer;
    },
    close: end,
  };
}
