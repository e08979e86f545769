import type { Dispatch } from 'react';
import { demoSet, keyOf, type Role, type SlotRole, slotRoles } from '../../state/inputs.ts';
import type { SheetAction, SheetState } from '../../state/sheet-state.ts';
import { traySlots } from '../../state/shown.ts';
import { TrayRecording } from './tray-recording.tsx';
import { TraySlot } from './tray-slot.tsx';

export interface TrayProps {
  readonly state: SheetState;
  readonly dispatch: Dispatch<SheetAction>;
  readonly choose: (role: Role | null) => void;
  readonly onDemo: () => void;
}

/** What went in: recordings as a queue, and the dark, response and bench they are used with. */
export function Tray({ state, dispatch, choose, onDemo }: TrayProps) {
  const { inputs, outcomes } = state;
  const { setId, slots, isWaiting } = traySlots(state);
  const hasDemo = inputs.recordings.some((entry) => entry.setId === demoSet);
  return (
    <aside className="tray" aria-label="Tray">
      <h2>Recordings</h2>
      <ul className="tray-recordings">
        {inputs.recordings.map((entry) => (
          <TrayRecording
            key={entry.id}
            entry={entry}
            outcome={outcomes.get(keyOf(inputs, entry))}
            isShown={entry.id === inputs.selectedId}
            dispatch={dispatch}
          />
        ))}
      </ul>
      <div className="tray-add">
        <button type="button" aria-keyshortcuts="Control+O" onClick={() => choose(null)}>
          Add files
        </button>
        {!hasDemo && (
          <button type="button" className="quiet" onClick={onDemo}>
            Open the demo
          </button>
        )}
      </div>
      <h2>Used with them</h2>
      <div className="tray-slots">
        {slotRoles.map((role: SlotRole) => (
          <TraySlot
            key={role}
            role={role}
            file={slots[role]}
            setId={setId}
            isWaiting={isWaiting}
            choose={choose}
            dispatch={dispatch}
          />
        ))}
      </div>
      <p className="tray-hint">Files can be dropped anywhere.</p>
    </aside>
  );
}
