import { type ReactNode, useId, useState } from 'react';

export interface SectionProps {
  readonly title: string;
  /** A few words beside the title that stay when the section is folded. */
  readonly summary?: ReactNode;
  readonly tools?: ReactNode;
  readonly isFoldedAtFirst?: boolean;
  readonly className?: string;
  readonly children: ReactNode;
}

/** A part of the sheet, in its fixed place; its title folds it. */
export function Section(props: SectionProps) {
  const [isFolded, setIsFolded] = useState(props.isFoldedAtFirst ?? false);
  const id = useId();
  return (
    <section className={`section ${props.className ?? ''}`} aria-labelledby={`${id}-title`}>
      <div className="section-head">
        <h2 id={`${id}-title`}>
          <button
            type="button"
            className="fold"
            aria-expanded={!isFolded}
            aria-controls={`${id}-body`}
            onClick={() => setIsFolded(!isFolded)}
          >
            <svg className="fold-mark" width="10" height="10" viewBox="0 0 10 10" aria-hidden="true">
              <path d="M2 3 L5 7 L8 3" />
            </svg>
            {props.title}
          </button>
        </h2>
        {props.summary !== undefined && <span className="section-summary">{props.summary}</span>}
        {props.tools !== undefined && !isFolded && <div className="section-tools">{props.tools}</div>}
      </div>
      <div id={`${id}-body`} className="section-body" hidden={isFolded}>
        {props.children}
      </div>
    </section>
  );
}
