import type { Dispatch } from 'react';
import type { InputFile } from '../../../shared-core/result/input-file.ts';
import { type Role, roleNames, type SlotRole, slotRoles } from '../../state/inputs.ts';
import type { SheetAction } from '../../state/sheet-state.ts';

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
    <div className="tray-slot" role="group" aria-label={name}>
      <div className="tray-tools">
        {file === null ? (
          <span className="tray-role">{name}</span>
        ) : (
          <RoleChoice role={role} file={file} setId={setId} dispatch={dispatch} />
        )}
        <button
          type="button"
          className="quiet"
          aria-label={file === null ? `Choose ${name}` : `Change ${name}`}
          onClick={() => choose(role)}
        >
          {file === null ? 'Choose' : 'Change'}
        </button>
        {file !== null && (
          <button
            type="button"
            className="quiet"
            aria-label={`Remove ${name} ${file.name}`}
            onClick={() => dispatch({ type: 'slot-removed', setId, role })}
          >
            Remove
          </button>
        )}
      </div>
      {file !== null && (
        <p className="tray-name" title={file.name}>
          {file.name}
        </p>
      )}
      {file === null && <p className="tray-state">{absent[role]}</p>}
      {file !== null && isWaiting && <p className="tray-state">waits for its recording</p>}
    </div>
  );
}

const roles = [...slotRoles, 'recording'] as const;

/** What the file is used as stands where its label would; another choice moves it there. */
function RoleChoice(props: {
  readonly role: SlotRole;
  readonly file: InputFile;
  readonly setId: string;
  readonly dispatch: Dispatch<SheetAction>;
}) {
  const { role, file, setId, dispatch } = props;
  return (
    <select
      className="tray-role"
      aria-label={`Use ${file.name} as`}
      value={role}
      onChange={(event) => {
        const to = roles.find((each) => each === event.target.value);
        if (to !== undefined) dispatch({ type: 'slot-reassigned', setId, from: role, role: to });
      }}
    >
      {roles.map((each) => (
        <option key={each} value={each}>
          {roleNames[each]}
        </option>
      ))}
    </select>
  );
}

const absent: Readonly<Record<SlotRole, string>> = {
  dark: 'none: offset from the recording',
  response: 'none: temperature uncorrected',
  bench: 'none: noise and width from the recording',
  profile: 'none: a lamp with sharp lines',
  mirror: 'none: the lamp, a mirror behind it',
  source: 'none: a light behind the tube, lamp off',
  through: 'none: the same light, lamp on',
};
