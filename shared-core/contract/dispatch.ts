import { fail, type Problem, type Result } from '../result/result.ts';
import type { z } from '../schema/zod.ts';
import {
  type InputOf,
  isServiceName,
  type OutputOf,
  type ServiceName,
  serviceTable,
} from './service-table.ts';
import type { Reply } from './reply.ts';

/** Tells a handler that nobody waits for its answer any more. */
export interface CancelSignal {
  onCancel(stop: () => void): void;
}

export type Handlers = {
  readonly [N in ServiceName]: (input: InputOf<N>, signal: CancelSignal) => Promise<Result<OutputOf<N>>>;
};

export interface Dispatcher {
  readonly handlers: Handlers;
  /** Keeps what happened and returns the id under which it can be found again. */
  readonly onIncident: (serviceName: string, error: unknown) => string;
  /** Runs `onEnd` after `timeLimitMs`; the returned function calls that off. */
  readonly startTimer: (timeLimitMs: number, onEnd: () => void) => () => void;
}

/**
 * The only path from a name and an unknown value to a handler, and back. Hosts move the answer, nothing else.
 * Unknown names and inputs of the wrong shape are refused; a throw or an answer of the wrong shape becomes
 * `service.internal` with the id of the incident; a call past its time limit is cancelled.
 */
export async function dispatch(deps: Dispatcher, name: string, rawInput: unknown): Promise<Reply<unknown>> {
  if (!isServiceName(name)) return fail(refusal('the name of a service', `"${name.slice(0, 60)}"`));
  const spec = serviceTable[name];
  const input = spec.input.safeParse(rawInput);
  if (!input.success) return fail(refusal(`the input of ${name}`, firstFault(input.error)));
  try {
    const reply = await withinLimit(deps, name, input.data);
    if (reply.ok) return { ok: true, value: spec.output.parse(reply.value) };
    const known: readonly string[] = spec.problems;
    if (known.includes(reply.problem.code) || reply.problem.code.startsWith('service.')) return reply;
    throw new Error(`${name} answered ${reply.problem.code}, which its row in the table does not list`);
  } catch (error) {
    return fail(internalFault(deps.onIncident(name, error)));
  }
}

function withinLimit(deps: Dispatcher, name: ServiceName, input: unknown): Promise<Reply<unknown>> {
  const { timeLimitMs } = serviceTable[name];
  const stops: (() => void)[] = [];
  const signal: CancelSignal = { onCancel: (stop) => void stops.push(stop) };
  // The input has just been parsed by the schema of this very row, which TypeScript cannot see across the union.
  const handler = deps.handlers[name] as (input: unknown, signal: CancelSignal) => Promise<Reply<unknown>>;
  return new Promise((resolve, reject) => {
    const callOff = deps.startTimer(timeLimitMs, () => {
      resolve(fail(timeout(name, timeLimitMs)));
      for (const stop of stops) stop();
    });
    // Through a promise, so that a handler that throws before its first await is caught as well.
    Promise.resolve()
      .then(() => handler(input, signal))
      .then(resolve, reject)
      .finally(callOff);
  });
}

function firstFault(error: z.ZodError): string {
  const issue = error.issues[0];
  if (issue === undefined) return 'something else';
  const path = issue.path.map(String).join('.');
  return path === '' ? issue.message : `${path}: ${issue.message}`;
}

const about = (
  code: Problem['code'],
  subject: string,
  expected: string,
  found: string,
  remedy: string,
): Problem => ({
  code,
  fileName: null,
  lineNumber: null,
  subject,
  expected,
  found,
  remedy,
});

/** A call that is refused at the door; also used by the hosts for the wrong sender or the wrong form. */
export function refusal(expected: string, found: string): Problem {
  return about(
    'service.refused',
    'call',
    expected,
    found,
    'Nothing was done; reload the window and try again.',
  );
}

function timeout(name: ServiceName, timeLimitMs: number): Problem {
  return about(
    'service.timeout',
    'call',
    `an answer from ${name} within ${String(timeLimitMs / 1000)} s`,
    'none yet',
    'The work was stopped; try again with a smaller file.',
  );
}

function internalFault(incidentId: string): Problem {
  return about(
    'service.internal',
    'call',
    'an answer',
    `a fault in this program, kept in its log as incident ${incidentId}`,
    'Nothing was changed; try again, and report the incident if it comes back.',
  );
}
