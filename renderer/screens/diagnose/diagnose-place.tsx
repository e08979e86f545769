import type { Dispatch } from 'react';
import type { Bench } from '../../../shared-core/bench/bench.ts';
import { problemSentence } from '../../../shared-core/result/result.ts';
import type { Role } from '../../state/inputs.ts';
import type { SheetAction, SheetState } from '../../state/sheet-state.ts';
import { shownOf } from '../../state/shown.ts';
import type { Saving } from '../../state/use-saving.ts';
import { Notices } from './notices.tsx';
import { Sheet } from './sheet.tsx';
import { Tray } from './tray.tsx';

export interface DiagnosePlaceProps {
  readonly state: SheetState;
  readonly dispatch: Dispatch<SheetAction>;
  readonly saving: Saving;
  readonly choose: (role: Role | null) => void;
  readonly onDemo: () => void;
  readonly onSafety: () => void;
  readonly bench: Bench;
}

/** The tray with what went in, and the sheet with what follows from it. */
export function DiagnosePlace(props: DiagnosePlaceProps) {
  const { state, dispatch } = props;
  const shown = shownOf(state);
  return (
    <div className="diagnose">
      <Tray state={state} dispatch={dispatch} choose={props.choose} onDemo={props.onDemo} />
      <main className="sheet">
        <h1 className="out-of-sight">Diagnose</h1>
        <Notices notices={state.notices} dispatch={dispatch} />
        {shown.kind === 'diagnosed' && (
          <Sheet
            key={shown.entry.id}
            shown={shown}
            dispatch={dispatch}
            saving={props.saving}
            bench={props.bench}
            onSafety={props.onSafety}
          />
        )}
        {shown.kind === 'unusable' && (
          <div className="sheet-instead">
            <p>{problemSentence(shown.problem)}</p>
            <p>In the tray you can give the file another use, remove it, or change what it is used with.</p>
          </div>
        )}
        {shown.kind === 'waiting' && <p className="sheet-instead">Diagnosing {shown.entry.file.name} …</p>}
        {shown.kind === 'nothing' && (
          <div className="sheet-instead">
            <p>
              Drop recordings anywhere in this window, with the dark, response and bench file that belong to
              them.
            </p>
            <p>
              <button type="button" onClick={() => props.choose(null)}>
                Add files
              </button>{' '}
              <button type="button" onClick={props.onDemo}>
                Open the demo
              </button>
            </p>
          </div>
        )}
      </main>
    </div>
  );
}
