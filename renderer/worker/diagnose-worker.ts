import { readLineTable } from '../../shared-core/identify/read-line-table.ts';
import { diagnoseFiles, drawFigures } from '../../shared-core/pipeline/diagnose-files.ts';
import { ok } from '../../shared-core/result/result.ts';
import type { DiagnoseRequest, FromWorker, ToWorker, WorkerSetup } from './protocol.ts';

/** Runs the chain beside the page, so that the window answers while it computes. One request at a time. */
let setup: WorkerSetup | null = null;

addEventListener('message', (event: MessageEvent<ToWorker>) => {
  const message = event.data;
  if (message.kind === 'setup') setup = message.setup;
  else postMessage(answer(message.request));
});

function answer(request: DiagnoseRequest): FromWorker {
  if (setup === null) throw new Error('the worker was asked before it was set up');
  const lineTable = readLineTable(setup.lineTableCsv);
  if (!lineTable.ok) return lineTable;
  const { options, ...files } = request;
  const computed = diagnoseFiles({
    ...files,
    options,
    lineTable: lineTable.value,
    programVersion: setup.programVersion,
  });
  return computed.ok ? ok(drawFigures(computed.value)) : computed;
}
