import { useCallback, useEffect, useState } from 'react';
import type { Client } from '../../shared-core/contract/client.ts';
import { palettes } from '../charts/palette.ts';
import { openDemo } from '../state/open-demo.ts';
import type { Role } from '../state/inputs.ts';
import { shownBench } from '../state/shown.ts';
import { takeFiles } from '../state/take-files.ts';
import { useSheet } from '../state/use-sheet.ts';
import { useSaving } from '../state/use-saving.ts';
import { PaletteContext, useTheme } from '../ui/theme.ts';
import { DiagnosePlace } from './diagnose/diagnose-place.tsx';
import { DropTarget } from './drop-target.tsx';
import { Frame, type Place } from './frame.tsx';
import { KeysDialog } from './keys-dialog.tsx';
import { SafetyPlace } from './safety/safety-place.tsx';
import { StatusLine } from './status-line.tsx';
import { chooseFiles } from '../client/choose-files.ts';
import { useShortcuts } from './use-shortcuts.ts';

/** The window: one frame, the place one is in, and the status line. */
export function App({ client }: { readonly client: Client }) {
  const sheet = useSheet(client);
  const { state, dispatch } = sheet;
  const theme = useTheme();
  const [place, setPlace] = useState<Place>('Diagnose');
  const [isShowingKeys, setIsShowingKeys] = useState(false);
  const saving = useSaving(state, dispatch);

  const add = useCallback(
    (files: readonly File[], role: Role | null = null) => void takeFiles(files, dispatch, role),
    [dispatch],
  );
  const choose = useCallback(
    (role: Role | null) => chooseFiles(role === null || role === 'recording', (files) => add(files, role)),
    [add],
  );
  useShortcuts({
    open: () => choose(null),
    save: saving.saveDiagnosis,
    undo: () => dispatch({ type: 'undo' }),
    redo: () => dispatch({ type: 'redo' }),
    showKeys: () => setIsShowingKeys(true),
  });
  useEffect(() => {
    document.title = place === 'Diagnose' ? 'Lampwright' : `${place} – Lampwright`;
  }, [place]);

  const bench = shownBench(state);
  return (
    <PaletteContext value={palettes[theme.theme]}>
      <Frame
        place={place}
        onPlace={setPlace}
        bench={bench}
        themeChoice={theme.choice}
        onTheme={theme.choose}
        onKeys={() => setIsShowingKeys(true)}
      >
        {place === 'Diagnose' ? (
          <DiagnosePlace
            state={state}
            dispatch={dispatch}
            saving={saving}
            choose={choose}
            onDemo={() => void openDemo(client, dispatch)}
            onSafety={() => setPlace('Safety')}
            bench={bench}
          />
        ) : (
          <SafetyPlace bench={bench} />
        )}
        <StatusLine sheet={sheet} />
      </Frame>
      <DropTarget onFiles={add} />
      {isShowingKeys && <KeysDialog onClose={() => setIsShowingKeys(false)} />}
    </PaletteContext>
  );
}
