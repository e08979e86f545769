import type { Dispatch } from 'react';
import type { Notice, SheetAction } from '../../state/sheet-state.ts';

/** Problems and news as lines that stay until they are dismissed; what is below them stays as it was. */
export function Notices(props: {
  readonly notices: readonly Notice[];
  readonly dispatch: Dispatch<SheetAction>;
}) {
  return (
    <div className="notices" role="region" aria-label="Messages" aria-live="polite">
      {props.notices.map((notice) => (
        <div key={notice.id} className={`notice is-${notice.kind}`}>
          <svg width="12" height="12" viewBox="0 0 12 12" aria-hidden="true">
            {notice.kind === 'problem' ? (
              <path d="M2 2 L10 10 M10 2 L2 10" />
            ) : (
              <path d="M2 6.5 L5 9.5 L10 2.5" />
            )}
          </svg>
          <p>{notice.text}</p>
          <button
            type="button"
            className="quiet"
            onClick={() => props.dispatch({ type: 'notice-dismissed', id: notice.id })}
          >
            Dismiss
          </button>
        </div>
      ))}
    </div>
  );
}
