import { readLineTable } from '../../shared-core/identify/read-line-table.ts';
import {
  type DiagnosedRecording,
  diagnoseFiles,
  drawFigures,
} from '../../shared-core/pipeline/diagnose-files.ts';
import { ok, type Result } from '../../shared-core/result/result.ts';
import type { DiagnoseRequest, FromWorker, ToWorker, WorkerSetup } from './protocol.ts';

/** Runs the chain beside the page, so that the window answers while it computes. One request at a time. */
let setup: WorkerSetup | null = null;

addEventListener('message', (event: MessageEvent<ToWorker>) => {
  const message = event.data;
  if (message.kind === 'setup') setup = message.setup;
  else post({ kind: 'done', outcome: answer(message.request) });
});

const post = (message: FromWorker): void => postMessage(message);

function answer(request: DiagnoseRequest): Result<DiagnosedRecording> {
  if (setup === null) throw new Error('the worker was asked before it was set up');
  const lineTable = readLineTable(setup.lineTableCsv);
  if (!lineTable.ok) return lineTable;
  const { options, ...files } = request;
  const computed = diagnoseFiles({
    ...files,
    options,
    lineTable: lineTable.value,
    programVersion: setup.programVersion,
    onTrials: (trials) => post({ kind: 'trials', trials }),
  });
  return computed.ok ? ok(drawFigures(computed.value)) : computed;
}
