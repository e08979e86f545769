import { useEffect, useRef, useState } from 'react';
import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import { formatDensity, temperatureAnswer } from '../../../shared-core/report/format-answer.ts';
import { lineLabel } from '../../../shared-core/report/line-label.ts';
import type { Saving } from '../../state/use-saving.ts';
import { Quantity } from '../../ui/quantity.tsx';
import { markClass, VerdictMark } from '../../ui/verdict-mark.tsx';
import { splitAnswer } from './split-answer.ts';

export interface AnswerStripProps {
  readonly diagnosis: Diagnosis;
  readonly isCurrent: boolean;
  readonly saving: Saving;
}

/** The answer, always in view: two numbers, how far to trust them, and why not further. */
export function AnswerStrip({ diagnosis, isCurrent, saving }: AnswerStripProps) {
  const [isShrunk, sentinel] = useIsScrolledPast();
  const isElectron = diagnosis.meaning.kind === 'electron-temperature';
  return (
    <>
      <div ref={sentinel} className="answer-sentinel" />
      <section
        className={`answer ${isShrunk ? 'is-shrunk' : ''}`}
        aria-labelledby="answer-title"
        aria-busy={!isCurrent}
      >
        <h2 id="answer-title" className="out-of-sight">
          Answer for {diagnosis.recording.name}
        </h2>
        <dl className="answer-numbers">
          <Answer
            name={isElectron ? 'electron temperature' : 'excitation temperature'}
            symbol={isElectron ? ['T', 'e'] : ['T', 'exc']}
            text={temperatureAnswer(diagnosis)}
            remark={diagnosis.temperature.responseCorrected ? null : 'response not corrected'}
          />
          <Answer
            name="electron density"
            symbol={['n', 'e']}
            text={formatDensity(diagnosis.electronDensity)}
            remark={
              diagnosis.electronDensity.line === null
                ? null
                : `from ${lineLabel(diagnosis.electronDensity.line)}`
            }
          />
        </dl>
        <p className={`answer-verdict ${markClass[diagnosis.verdict]}`}>
          <VerdictMark kind={diagnosis.verdict} size={20} />
          <strong>{diagnosis.verdict}</strong>
        </p>
        <div className="answer-save" role="group" aria-label="Save">
          <button type="button" disabled={!saving.canSave} onClick={saving.saveReport}>
            Save report
          </button>
          <button
            type="button"
            disabled={!saving.canSave}
            onClick={saving.saveDiagnosis}
            aria-keyshortcuts="Control+S"
          >
            Save diagnosis
          </button>
          <button type="button" disabled={!saving.canSave} onClick={saving.saveJson}>
            Save as JSON
          </button>
        </div>
        <p className="answer-why">{diagnosis.verdictText}</p>
      </section>
    </>
  );
}

function Answer(props: {
  readonly name: string;
  readonly symbol: readonly [string, string];
  readonly text: string;
  readonly remark: string | null;
}) {
  const { value, unit, rest } = splitAnswer(props.text);
  return (
    <div className="answer-item">
      <dt>
        <span className="answer-symbol">
          <i>{props.symbol[0]}</i>
          <sub>{props.symbol[1]}</sub>
        </span>{' '}
        <span className="answer-name">{props.name}</span>
      </dt>
      <dd>
        <span className={unit === '' ? 'answer-value is-words' : 'answer-value'}>
          <Quantity text={value} />
          {unit !== '' && (
            <span className="unit">
              {' '}
              <Quantity text={unit} />
            </span>
          )}
        </span>{' '}
        <span className="answer-interval">
          <Quantity text={rest} />
          {props.remark !== null && <span className="answer-remark">{props.remark}</span>}
        </span>
      </dd>
    </div>
  );
}

/** True once the sheet is scrolled below its top, so that the strip gives its height to what one reads. */
function useIsScrolledPast() {
  const [isPast, setIsPast] = useState(false);
  const sentinel = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (sentinel.current === null) return undefined;
    const observer = new IntersectionObserver(([entry]) => setIsPast(entry?.isIntersecting === false), {
      // Shrinks only once more has gone by than the strip gives up, or it would flicker at the edge.
      rootMargin: '96px 0px 0px 0px',
    });
    observer.observe(sentinel.current);
    return () => observer.disconnect();
  }, []);
  return [isPast, sentinel] as const;
}
