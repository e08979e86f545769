import { useEffect } from 'react';

export interface Shortcuts {
  readonly open: () => void;
  readonly save: () => void;
  readonly undo: () => void;
  readonly redo: () => void;
  readonly showKeys: () => void;
}

/** Keys that work anywhere in the window; KeysDialog lists them. */
export function useShortcuts(shortcuts: Shortcuts): void {
  useEffect(() => {
    const onKey = (event: KeyboardEvent): void => {
      const action = shortcutFor(event);
      if (action === null) return;
      event.preventDefault();
      shortcuts[action]();
    };
    addEventListener('keydown', onKey);
    return () => removeEventListener('keydown', onKey);
  }, [shortcuts]);
}

/** What a key press asks for; Ctrl, or the command key where there is one. */
export function shortcutFor(event: {
  readonly key: string;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly shiftKey: boolean;
  readonly altKey: boolean;
}): keyof Shortcuts | null {
  if (event.altKey) return null;
  const key = event.key.toLowerCase();
  if (!event.ctrlKey && !event.metaKey) return key === '?' ? 'showKeys' : null;
  if (key === 'z') return event.shiftKey ? 'redo' : 'undo';
  if (key === 'y') return 'redo';
  if (event.shiftKey) return null;
  if (key === 'o') return 'open';
  return key === 's' ? 'save' : null;
}
