import type { DiagnosedLine } from '../../../shared-core/diagnosis/diagnosis.ts';
import type { LineFigure } from '../../../shared-core/diagnosis/figures.ts';
import { Section } from '../../ui/section.tsx';
import { LineCard } from './line-card.tsx';

export interface LinesSectionProps {
  readonly lines: readonly DiagnosedLine[];
  readonly figures: readonly LineFigure[];
  /** Lines that the person left out. */
  readonly leftOut: readonly string[];
  readonly onSwitch: (lineId: string) => void;
}

/** The lines side by side, each with its fit and its switch. */
export function LinesSection({ lines, figures, leftOut, onSwitch }: LinesSectionProps) {
  const usedCount = lines.filter((line) => line.used).length;
  const figureOf = new Map(figures.map((figure) => [figure.lineId, figure]));
  return (
    <Section title="Lines" summary={`${String(usedCount)} of ${String(lines.length)} used`} className="lines">
      <ul className="line-strip">
        {lines.map((line) => (
          <LineCard
            key={line.id}
            line={line}
            figure={figureOf.get(line.id) ?? null}
            isLeftOut={leftOut.includes(line.id)}
            onSwitch={onSwitch}
          />
        ))}
      </ul>
    </Section>
  );
}
