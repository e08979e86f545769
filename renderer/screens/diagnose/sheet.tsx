import type { Dispatch } from 'react';
import type { Bench } from '../../../shared-core/bench/bench.ts';
import type { ChoicesMade } from '../../state/inputs.ts';
import type { SheetAction } from '../../state/sheet-state.ts';
import type { Shown } from '../../state/shown.ts';
import type { Saving } from '../../state/use-saving.ts';
import { AnswerStrip } from './answer-strip.tsx';
import { BudgetSection } from './budget-section.tsx';
import { CautionsSection } from './cautions-section.tsx';
import { ChecksSection } from './checks-section.tsx';
import { CrossChecksSection } from './cross-checks-section.tsx';
import { ImpuritiesSection } from './impurities-section.tsx';
import { LinesSection } from './lines-section.tsx';
import { MethodSection } from './method-section.tsx';
import { OpticalDepthSection } from './optical-depth-section.tsx';
import { PopulationsSection } from './populations-section.tsx';
import { RecordingSection } from './recording-section.tsx';

export interface SheetProps {
  readonly shown: Extract<Shown, { kind: 'diagnosed' }>;
  readonly dispatch: Dispatch<SheetAction>;
  readonly saving: Saving;
  readonly bench: Bench;
  readonly onSafety: () => void;
}

/** The sheet in the order of its argument; nothing hides behind a tab. */
export function Sheet({ shown, dispatch, saving, bench, onSafety }: SheetProps) {
  const { diagnosis, figures, recording } = shown.output;
  const switchLine = (lineId: string): void =>
    dispatch({ type: 'line-switched', recordingId: shown.entry.id, lineId });
  const choose = (choices: ChoicesMade): void =>
    dispatch({ type: 'choice-made', recordingId: shown.entry.id, choices });
  return (
    <>
      <AnswerStrip diagnosis={diagnosis} isCurrent={shown.isCurrent} saving={saving} />
      <RecordingSection figure={figures.recording} recording={recording} axisText={diagnosis.axis.text} />
      <LinesSection
        lines={diagnosis.lines}
        figures={figures.lines}
        leftOut={shown.entry.options.leftOut}
        onSwitch={switchLine}
      />
      <PopulationsSection figure={figures.populations} diagnosis={diagnosis} dispatch={dispatch} />
      <CrossChecksSection diagnosis={diagnosis} onChoose={choose} />
      <OpticalDepthSection opticalDepths={diagnosis.opticalDepths} />
      <ChecksSection checks={diagnosis.checks} />
      <BudgetSection diagnosis={diagnosis} onChoose={choose} />
      <ImpuritiesSection diagnosis={diagnosis} />
      <CautionsSection bench={bench} onSafety={onSafety} />
      <MethodSection diagnosis={diagnosis} recording={recording} />
    </>
  );
}
