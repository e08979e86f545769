import { useState } from 'react';
import type { RecordingFigure } from '../../../shared-core/diagnosis/figures.ts';
import type { Recording } from '../../../shared-core/recording/recording.ts';
import { isWhole, type ViewRange } from '../../charts/view-range.ts';
import { Section } from '../../ui/section.tsx';
import { RecordingChart } from './recording-chart.tsx';
import { cursorText } from './cursor-text.ts';
import { understoodText } from './understood-text.ts';

export interface RecordingSectionProps {
  readonly figure: RecordingFigure;
  readonly recording: Recording;
  readonly axisText: string;
}

export function RecordingSection({ figure, recording, axisText }: RecordingSectionProps) {
  const whole: ViewRange = {
    fromNm: figure.wavelengthNm[0] ?? 0,
    toNm: figure.wavelengthNm.at(-1) ?? 1,
  };
  const [range, setRange] = useState(whole);
  const [isLog, setIsLog] = useState(false);
  const [cursor, setCursor] = useState<number | null>(null);
  const tools = (
    <>
      <output className="cursor-readout">{cursorText(figure, cursor)}</output>
      <span className="button-pair" role="group" aria-label="Scale of the counts">
        <button type="button" aria-pressed={!isLog} onClick={() => setIsLog(false)}>
          linear
        </button>
        <button type="button" aria-pressed={isLog} onClick={() => setIsLog(true)}>
          log
        </button>
      </span>
      <button type="button" disabled={isWhole(range, whole)} onClick={() => setRange(whole)}>
        Whole
      </button>
    </>
  );
  return (
    <Section title="Recording" summary={recording.name} tools={tools} className="recording">
      <RecordingChart
        figure={figure}
        whole={whole}
        range={range}
        onRange={setRange}
        isLog={isLog}
        onLog={() => setIsLog(!isLog)}
        cursor={cursor}
        onCursor={setCursor}
      />
      <p className="fine-print">
        {understoodText(recording.understood)} {axisText}
        {recording.notes.map((note) => ` ${note.text}`)}
      </p>
    </Section>
  );
}
