import { type Dispatch, useId } from 'react';
import { demoSet, type RecordingEntry, roleNames, slotRoles } from '../../state/inputs.ts';
import type { Outcome, SheetAction } from '../../state/sheet-state.ts';
import { type MarkKind, VerdictMark } from '../../ui/verdict-mark.tsx';

export interface TrayRecordingProps {
  readonly entry: RecordingEntry;
  readonly outcome: Outcome | undefined;
  readonly isShown: boolean;
  readonly dispatch: Dispatch<SheetAction>;
}

/** One recording of the queue with its verdict; the shown one can be given another use or removed. */
export function TrayRecording({ entry, outcome, isShown, dispatch }: TrayRecordingProps) {
  const id = useId();
  const kind = markKind(outcome);
  const { name } = entry.file;
  return (
    <li className={isShown ? 'tray-recording is-shown' : 'tray-recording'}>
      <button
        type="button"
        className="tray-pick"
        aria-current={isShown ? 'true' : undefined}
        onClick={() => dispatch({ type: 'selected', recordingId: entry.id })}
      >
        <VerdictMark kind={kind} />
        <span className="tray-name" title={name}>
          {name}
        </span>
        <span className="tray-state">
          {stateWords(kind)}
          {entry.setId === demoSet && ', demo'}
          {entry.options.leftOut.length > 0 && `, ${String(entry.options.leftOut.length)} left out`}
        </span>
      </button>
      {isShown && (
        <div className="tray-tools">
          <label htmlFor={id}>use as</label>
          <select
            id={id}
            value="recording"
            onChange={(event) => {
              const role = slotRoles.find((each) => each === event.target.value);
              if (role !== undefined) dispatch({ type: 'recording-reassigned', recordingId: entry.id, role });
            }}
          >
            <option value="recording">recording</option>
            {slotRoles.map((role) => (
              <option key={role} value={role}>
                {roleNames[role]}
              </option>
            ))}
          </select>
          <button
            type="button"
            className="quiet"
            aria-label={`Remove ${name}`}
            onClick={() => dispatch({ type: 'recording-removed', recordingId: entry.id })}
          >
            Remove
          </button>
        </div>
      )}
    </li>
  );
}

function markKind(outcome: Outcome | undefined): MarkKind {
  if (outcome === undefined) return 'waiting';
  return outcome.ok ? outcome.value.diagnosis.verdict : 'unusable';
}

const stateWords = (kind: MarkKind): string => (kind === 'unusable' ? 'cannot be used' : kind);
