import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import type { Recording } from '../../../shared-core/recording/recording.ts';
import { formatExact, formatPercent } from '../../../shared-core/text/format-number.ts';
import { Section } from '../../ui/section.tsx';

export interface MethodSectionProps {
  readonly diagnosis: Diagnosis;
  readonly recording: Recording;
}

/** How it was computed: enough for another person to get the same numbers. */
export function MethodSection({ diagnosis, recording }: MethodSectionProps) {
  const { inputs, options, program } = diagnosis;
  return (
    <Section
      title="How it was computed"
      className="method"
      summary={`version ${program.version}`}
      isFoldedAtFirst
    >
      <dl className="method-list">
        <Row name="recording" value={recording.name} hash={diagnosis.recording.sha256} />
        <Row name="dark" value={inputs.dark?.name ?? 'none'} hash={inputs.dark?.sha256} />
        <Row
          name="response"
          value={inputs.response === null ? 'none' : `${inputs.response.name}, per ${inputs.response.per}`}
          hash={inputs.response?.sha256}
        />
        {inputs.profile !== null && (
          <Row name="reference lamp" value={inputs.profile.name} hash={inputs.profile.sha256} />
        )}
        {inputs.mirror !== null && (
          <Row name="with mirror" value={inputs.mirror.name} hash={inputs.mirror.sha256} />
        )}
        {inputs.source !== null && (
          <Row name="source alone" value={inputs.source.name} hash={inputs.source.sha256} />
        )}
        {inputs.through !== null && (
          <Row name="source through the tube" value={inputs.through.name} hash={inputs.through.sha256} />
        )}
        <Row name="bench" value={inputs.bench ?? 'not described'} />
        <Row name="upper levels" value={options.upperLevels.join(', ')} />
        <Row name="left out" value={options.leftOut.length === 0 ? 'none' : options.leftOut.join(', ')} />
        <Row name="deuterium" value={options.deuterium} />
        <Row name="coverage" value={formatPercent(options.coverage, 1)} />
        <Row
          name="range"
          value={`${formatExact(diagnosis.recording.firstNm)} to ${formatExact(diagnosis.recording.lastNm)} nm in ${diagnosis.recording.medium}, ${formatExact(diagnosis.recording.pointCount)} points`}
        />
      </dl>
      {diagnosis.notes.length > 0 && (
        <>
          <h3>Notes</h3>
          <ul className="notes">
            {diagnosis.notes.map((note) => (
              <li key={note}>{note}</li>
            ))}
          </ul>
        </>
      )}
    </Section>
  );
}

function Row(props: { readonly name: string; readonly value: string; readonly hash?: string | undefined }) {
  return (
    <div>
      <dt>{props.name}</dt>
      <dd>
        {props.value}
        {props.hash !== undefined && <code className="hash">SHA-256 {props.hash}</code>}
      </dd>
    </div>
  );
}
