import type { Verdict } from '../../shared-core/diagnosis/diagnosis.ts';

export type MarkKind = Verdict | 'waiting' | 'unusable';

/** Shape first, colour second: disc, triangle, square; a ring while it waits, a cross where nothing could be had. */
export function VerdictMark({ kind, size = 12 }: { readonly kind: MarkKind; readonly size?: number }) {
  return (
    <svg
      className={`mark ${markClass[kind]}`}
      width={size}
      height={size}
      viewBox="0 0 12 12"
      aria-hidden="true"
    >
      {shapes[kind]}
    </svg>
  );
}

const shapes: Record<MarkKind, React.ReactNode> = {
  sound: <circle cx="6" cy="6" r="5" />,
  'use with care': <path d="M6 0.8 L11.6 11 H0.4 Z" />,
  'not defensible': <rect x="1" y="1" width="10" height="10" />,
  waiting: <circle cx="6" cy="6" r="4.3" className="mark-outline" />,
  unusable: <path d="M2 2 L10 10 M10 2 L2 10" className="mark-outline" />,
};

export const markClass: Record<MarkKind, string> = {
  sound: 'is-sound',
  'use with care': 'is-care',
  'not defensible': 'is-not',
  waiting: 'is-waiting',
  unusable: 'is-not',
};
