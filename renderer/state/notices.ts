import type { Notice, SheetState } from './sheet-state.ts';

/** Older lines give way: nobody reads the fiftieth, and the tray still marks every file. */
const maxNotices = 30;

/** Adds a line at the top of the sheet; the same sentence is not said twice. */
export function noticed(state: SheetState, kind: Notice['kind'], text: string): SheetState {
  const others = state.notices.filter((notice) => notice.text !== text);
  const notices = [...others, { id: state.nextId, kind, text }].slice(-maxNotices);
  return { ...state, notices, nextId: state.nextId + 1 };
}
