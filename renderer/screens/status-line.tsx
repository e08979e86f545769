import { formatExact } from '../../shared-core/text/format-number.ts';
import { workToDo } from '../state/schedule.ts';
import type { Sheet } from '../state/use-sheet.ts';

/** What was just done, what is running and how to end it, and the way back. */
export function StatusLine({ sheet }: { readonly sheet: Sheet }) {
  const { state, dispatch, running, trials, stop } = sheet;
  const left = workToDo(state).length;
  const total = state.inputs.recordings.length;
  const lastStep = state.past.at(-1);
  const nextStep = state.future.at(-1);
  return (
    <footer className="status-line">
      <span role="status" className="status-done">
        {state.lastDone}
      </span>
      {running !== null && (
        <span className="status-running">
          <progress aria-label="recordings diagnosed" value={total - left} max={total} />
          diagnosing {running}
          {trials > 0 && `, ${formatExact(trials)} Monte Carlo trials`}
          {left > 1 && `, ${String(left)} to go`}
          <button type="button" onClick={stop}>
            Stop
          </button>
        </span>
      )}
      {state.isStopped && left > 0 && (
        <span className="status-running">
          {left} not diagnosed
          <button type="button" onClick={() => dispatch({ type: 'resumed' })}>
            Go on
          </button>
        </span>
      )}
      <span className="status-history">
        <button
          type="button"
          disabled={lastStep === undefined}
          title={lastStep?.label}
          aria-keyshortcuts="Control+Z"
          onClick={() => dispatch({ type: 'undo' })}
        >
          Undo
        </button>
        <button
          type="button"
          disabled={nextStep === undefined}
          title={nextStep?.label}
          aria-keyshortcuts="Control+Shift+Z"
          onClick={() => dispatch({ type: 'redo' })}
        >
          Redo
        </button>
      </span>
      <span className="status-version">{sheet.version === '' ? '' : `version ${sheet.version}`}</span>
    </footer>
  );
}
