import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import { lineLabel } from '../../../shared-core/report/line-label.ts';
import {
  columnRange,
  depthRange,
  lightThatLeaves,
  methodWord,
  opticalDepthCaption,
  seenAtLine,
  seenAtThinLines,
  whyNot,
} from '../../../shared-core/report/optical-depth-section.ts';
import { Prose } from '../../ui/prose.tsx';
import { Quantity } from '../../ui/quantity.tsx';
import { Section } from '../../ui/section.tsx';

/** What a mirror or a light source behind the tube shows; there only when one was recorded. */
export function OpticalDepthSection({
  opticalDepths,
}: {
  readonly opticalDepths: Diagnosis['opticalDepths'];
}) {
  const [first] = opticalDepths;
  if (first === undefined) return null;
  return (
    <Section title="Optical depth" className="optical-depth" summary={summaryOf(opticalDepths)}>
      <table className="numbers">
        <caption>{opticalDepthCaption(first.coverage)}</caption>
        <thead>
          <tr>
            <th scope="col">line</th>
            <th scope="col">with</th>
            <th scope="col">seen</th>
            <th scope="col">thin lines</th>
            <th scope="col">optical depth</th>
            <th scope="col">atoms in n = 2, m⁻²</th>
            <th scope="col">light that leaves</th>
          </tr>
        </thead>
        <tbody>
          {opticalDepths.map((each) => (
            <tr key={`${each.lineId} ${each.method}`}>
              <th scope="row">{lineLabel(each.lineId)}</th>
              <td className="is-text">{methodWord[each.method]}</td>
              <td>{seenAtLine(each)}</td>
              <td>{seenAtThinLines(each)}</td>
              <td title={each.text}>{depthRange(each)}</td>
              <td>
                <Quantity text={columnRange(each)} />
              </td>
              <td>{lightThatLeaves(each)}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {whyNot(opticalDepths).map((sentence) => (
        <p key={sentence}>
          <Prose text={sentence} />
        </p>
      ))}
    </Section>
  );
}

function summaryOf(opticalDepths: Diagnosis['opticalDepths']): string {
  const absorbed = new Set(
    opticalDepths.filter(({ status }) => status === 'measured').map(({ lineId }) => lineLabel(lineId)),
  );
  return absorbed.size === 0 ? 'no absorption seen' : `${[...absorbed].join(', ')} absorbed`;
}
