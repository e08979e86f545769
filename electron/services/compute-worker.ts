import { parentPort } from 'node:worker_threads';
import { type DiagnosisAnswer, type DiagnosisJob, runDiagnosis } from './run-diagnosis.ts';

/** What the worker sends back: an answer, or the fault that hindered it. */
export type WorkerMessage =
  | { readonly kind: 'answer'; readonly answer: DiagnosisAnswer }
  | { readonly kind: 'fault'; readonly detail: string };

parentPort?.on('message', (job: DiagnosisJob) => {
  runDiagnosis(job).then(
    (answer) => send({ kind: 'answer', answer }),
    (error: unknown) => send({ kind: 'fault', detail: detailOf(error) }),
  );
});

function send(message: WorkerMessage): void {
  parentPort?.postMessage(message);
}

function detailOf(error: unknown): string {
  return error instanceof Error ? (error.stack ?? error.message) : String(error);
}
