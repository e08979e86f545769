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
      const stopListening = (): void => void current.removeAllListeners();
      current.once('message', (message: WorkerMessage) => {
        stopListening();
        if (message.kind === 'answer') resolve(message.answer);
        else reject(new Error(message.detail));
      });
      const broken = (error: Error): void => {
        stopListening();
        if (worker === current) worker = null;
        reject(error);
      };
      current.once('error', broken);
      current.once('exit', () => broken(new Error('the compute worker ended before it answered')));
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
