import { expect, test, vi } from 'vitest';
import { type Dispatcher, dispatch, type Handlers } from '../../../shared-core/contract/dispatch.ts';
import { maxFileBytes } from '../../../shared-core/contract/limits.ts';
import { serviceTable } from '../../../shared-core/contract/service-table.ts';
import { fail, ok, type Problem } from '../../../shared-core/result/result.ts';

const info = {
  name: 'lampwright' as const,
  version: '0.1.0',
  maxFileBytes: maxFileBytes,
};
const problem = (code: Problem['code']): Problem => ({
  code,
  fileName: null,
  lineNumber: null,
  subject: 'recording',
  expected: 'a',
  found: 'b',
  remedy: 'c',
});

function dispatcher(
  changes: Partial<Handlers> = {},
  startTimer: Dispatcher['startTimer'] = () => () => undefined,
) {
  const incidents: unknown[] = [];
  const handlers: Handlers = {
    'app.info': () => Promise.resolve(ok(info)),
    'demo.open': () => Promise.resolve(fail(problem('file.unreadable'))),
    'lines.table': () => Promise.resolve(ok({ csv: 'a' })),
    'diagnosis.run': () => Promise.resolve(ok({ diagnosisJson: '{}' })),
    ...changes,
  };
  const onIncident = (_name: string, error: unknown): string => `id-${String(incidents.push(error))}`;
  return { deps: { handlers, onIncident, startTimer }, incidents };
}

const codeOf = (reply: { ok: boolean; problem?: Problem }): string | undefined => reply.problem?.code;

test('carries an answer from the handler to the caller', async () => {
  expect(await dispatch(dispatcher().deps, 'app.info', {})).toEqual({ ok: true, value: info });
});

test.each(['toString', '__proto__', 'constructor', 'hasOwnProperty', '', 'app.info ', 'App.info'])(
  'refuses %j, which is no row of the table',
  async (name) => {
    expect(codeOf(await dispatch(dispatcher().deps, name, {}))).toBe('service.refused');
  },
);

test.each([null, undefined, 'x', 7, [], { more: 1 }])('refuses the input %j of app.info', async (input) => {
  const reply = await dispatch(dispatcher().deps, 'app.info', input);
  expect(codeOf(reply)).toBe('service.refused');
});

test('names the field of a wrong input', async () => {
  const reply = await dispatch(dispatcher().deps, 'diagnosis.run', {
    recording: { name: 'a.csv', bytesBase64: 3 },
    dark: null,
    response: null,
    bench: null,
    options: { leftOut: [] },
  });
  expect(reply.ok ? '' : reply.problem.found).toContain('recording.bytesBase64');
});

test.each([
  ['rejects', () => Promise.reject(new Error('boom'))],
  [
    'throws before its first await',
    () => {
      throw new Error('boom');
    },
  ],
])('turns a handler that %s into an incident with its id', async (_how, handler) => {
  const { deps, incidents } = dispatcher({ 'app.info': handler });
  const reply = await dispatch(deps, 'app.info', {});
  expect(codeOf(reply)).toBe('service.internal');
  expect(reply.ok ? '' : reply.problem.found).toContain('id-1');
  expect(incidents).toEqual([new Error('boom')]);
});

test('turns an answer of the wrong shape into an incident', async () => {
  const wrong = { ...info, extra: 1 };
  const { deps } = dispatcher({ 'app.info': () => Promise.resolve(ok(wrong)) });
  expect(codeOf(await dispatch(deps, 'app.info', {}))).toBe('service.internal');
});

test('turns a problem that the table does not list into an incident', async () => {
  const { deps, incidents } = dispatcher({
    'lines.table': () => Promise.resolve(fail(problem('dark.length'))),
  });
  expect(codeOf(await dispatch(deps, 'lines.table', {}))).toBe('service.internal');
  expect(String(incidents[0])).toContain('dark.length');
});

test('passes on a problem that the table lists', async () => {
  expect(codeOf(await dispatch(dispatcher().deps, 'demo.open', {}))).toBe('file.unreadable');
});

test('cancels a call past its time limit and says so', async () => {
  const limits: number[] = [];
  const stop = vi.fn();
  const { deps } = dispatcher(
    {
      'lines.table': (_input, signal) => {
        signal.onCancel(stop);
        return new Promise(() => undefined);
      },
    },
    (timeLimitMs, onEnd) => {
      limits.push(timeLimitMs);
      setTimeout(onEnd, 0);
      return () => undefined;
    },
  );
  expect(codeOf(await dispatch(deps, 'lines.table', {}))).toBe('service.timeout');
  expect(stop).toHaveBeenCalledTimes(1);
  expect(limits).toEqual([serviceTable['lines.table'].timeLimitMs]);
});

test('calls the timer off when the answer comes in time', async () => {
  const callOff = vi.fn();
  const { deps } = dispatcher({}, () => callOff);
  await dispatch(deps, 'app.info', {});
  await vi.waitFor(() => expect(callOff).toHaveBeenCalledTimes(1));
});
