import type { Dispatch } from 'react';
import type { InputFile } from '../../../shared-core/result/input-file.ts';
import { type Role, type SlotRole, slotRoles } from '../../state/inputs.ts';
import type { SheetAction } from '../../state/sheet-state.ts';
import { roleNames } from './role-names.ts';

export interface TraySlotProps {
  readonly role: SlotRole;
  readonly file: InputFile | null;
  readonly setId: string;
  /** True while the file waits for a recording of the person's own. */
  readonly isWaiting: boolean;
  readonly choose: (role: Role) => void;
  readonly dispatch: Dispatch<SheetAction>;
}

/** Dark, response or bench file: which one is in use, or what its absence means. */
export function TraySlot({ role, file, setId, isWaiting, choose, dispatch }: TraySlotProps) {
  const name = roleNames[role];
  return (
    <div className="tray-slot">
      <dt>{name}</dt>
      <dd>
        {file === null ? (
          <>
            <span className="tray-state">{absent[role]}</span>
            <div className="tray-tools">
              <button type="button" aria-label={`Choose ${name}`} onClick={() => choose(role)}>
                Choose
              </button>
            </div>
          </>
        ) : (
          <>
            <span className="tray-name" title={file.name}>
              {file.name}
            </span>
            {isWaiting && <span className="tray-state">waits for its recording</span>}
            <div className="tray-tools">
              <select
                aria-label={`Use ${file.name} as`}
                value={role}
                onChange={(event) => {
                  const to = ([...slotRoles, 'recording'] as const).find((each) => each === event.target.value);
                  if (to !== undefined) dispatch({ type: 'slot-reassigned', setId, from: role, role: to });
                }}
              >
                {([...slotRoles, 'recording'] as const).map((each) => (
                  <option key={each} value={each}>
                    {roleNames[each]}
                  </option>
                ))}
              </select>
              <button type="button" aria-label={`Change ${name}`} onClick={() => choose(role)}>
                Change
              </button>
              <button
                type="button"
                className="quiet"
                aria-label={`Remove ${name} ${file.name}`}
                onClick={() => dispatch({ type: 'slot-removed', setId, role })}
              >
                Remove
              </button>
            </div>
          </>
        )}
      </dd>
    </div>
  );
}

const absent: Readonly<Record<SlotRole, string>> = {
  dark: 'none: offset from the recording',
  response: 'none: temperature uncorrected',
  bench: 'none: noise and width from the recording',
};
