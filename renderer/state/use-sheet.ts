import { type Dispatch, useEffect, useReducer, useRef, useState } from 'react';
import type { Client } from '../../shared-core/contract/client.ts';
import { createDiagnoseRunner, type DiagnoseRunner } from '../worker/diagnose-runner.ts';
import { openDemo } from './open-demo.ts';
import { type Work, workToDo } from './schedule.ts';
import { firstState, type SheetAction, type SheetState } from './sheet-state.ts';
import { sheetReducer } from './sheet-reducer.ts';

export interface Sheet {
  readonly state: SheetState;
  readonly dispatch: Dispatch<SheetAction>;
  readonly version: string;
  /** Name of the recording that is being diagnosed. */
  readonly running: string | null;
  /** Monte Carlo trials drawn for it so far; 0 where none were asked for. */
  readonly trials: number;
  readonly stop: () => void;
}

/** The sheet's state, and the worker that keeps up with it. */
export function useSheet(client: Client): Sheet {
  const [state, dispatch] = useReducer(sheetReducer, firstState);
  const [version, setVersion] = useState('');
  const [runner, setRunner] = useState<DiagnoseRunner | null>(null);
  const [job, setJob] = useState<Work | null>(null);
  const [trials, setTrials] = useState(0);
  const hasBegun = useRef(false);

  useEffect(() => {
    if (hasBegun.current) return;
    hasBegun.current = true;
    void begin(client, dispatch).then((begun) => {
      if (begun === null) return;
      setVersion(begun.programVersion);
      setRunner(createDiagnoseRunner(begun));
      void openDemo(client, dispatch);
    });
  }, [client]);

  const next = state.isStopped ? null : (workToDo(state)[0] ?? null);
  if (job === null && next !== null && runner !== null) setJob(next);

  useEffect(() => {
    if (job === null || runner === null) return undefined;
    let isCurrent = true;
    const { entry, slots } = job;
    const request = { recording: entry.file, ...slots, options: entry.options };
    void runner.run(request, setTrials).then((outcome) => {
      setTrials(0);
      if (!isCurrent) return;
      dispatch({ type: 'computed', key: job.key, outcome });
      setJob(null);
    });
    return () => {
      isCurrent = false;
    };
  }, [job, runner]);

  const stop = (): void => {
    runner?.stop();
    dispatch({ type: 'stopped' });
    setTrials(0);
    setJob(null);
  };
  return { state, dispatch, version, running: job?.entry.file.name ?? null, trials, stop };
}

async function begin(client: Client, dispatch: Dispatch<SheetAction>) {
  const [info, lines] = await Promise.all([client.call('app.info', {}), client.call('lines.table', {})]);
  if (!info.ok) dispatch({ type: 'problem-met', problem: info.problem });
  if (!lines.ok) dispatch({ type: 'problem-met', problem: lines.problem });
  return info.ok && lines.ok ? { programVersion: info.value.version, lineTableCsv: lines.value.csv } : null;
}
