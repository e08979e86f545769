import type { Bench } from '../bench/bench.ts';
import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import { type Answer, densityParts, isTemperatureWithheld, supportedTemperature } from './format-answer.ts';
import { formatAtPlace, formatExact } from '../text/format-number.ts';
import { factList, paragraph, text } from './html.ts';
import { lineLabel } from './line-label.ts';
import { element } from './svg.ts';
import { verdictShapeSvg } from './verdict-shape.ts';

/** Verdict first, then the two answers, what they may be read as, and what was recorded. */
export function answerSection(diagnosis: Diagnosis, bench: Bench, generatedAt: string | null): string {
  const { verdict, verdictText, temperature, electronDensity, meaning } = diagnosis;
  const isElectronic = meaning.kind === 'electron-temperature';
  return [
    element(
      'div',
      { class: 'verdict', role: 'group', 'aria-label': 'verdict' },
      verdictShapeSvg(verdict, 22),
      `<div><p class="verdict-word">${text(verdict)}</p>${paragraph(verdictText)}</div>`,
    ),
    '\n<div class="answers">',
    answerBox(
      isElectronic ? 'Electron temperature' : 'Excitation temperature',
      supportedTemperature(diagnosis),
      isTemperatureWithheld(diagnosis)
        ? 'The fit gave a number, but the checks do not support it; it is withheld.'
        : temperature.text,
      temperature.status === 'lower-limit' ? 'lower limit' : 'interval',
    ),
    answerBox(
      'Electron density',
      densityParts(electronDensity),
      electronDensity.text,
      electronDensity.status === 'upper-limit' ? 'upper limit' : 'interval',
      electronDensity.line,
    ),
    '</div>\n',
    temperature.responseCorrected || temperature.status === 'not-determined'
      ? ''
      : paragraph(
          'Not corrected for the spectral response: a value for comparison on this bench only.',
          'meaning warning',
        ),
    paragraph(meaning.text, 'meaning'),
    identity(diagnosis, bench, generatedAt),
  ].join('');
}

/** One answer: the value large, the interval and its coverage below, then the reason in words. */
function answerBox(
  label: string,
  answer: Answer,
  why: string,
  kind: 'interval' | 'lower limit' | 'upper limit',
  lineId: string | null = null,
): string {
  const isNumber = answer.interval !== null;
  const reach =
    answer.interval === null
      ? ''
      : kind === 'interval'
        ? `${answer.interval.replace(/, ([^,]*)$/, ' ($1 coverage)')}`
        : `${kind}, ${answer.interval} coverage`;
  const from = lineId === null || !isNumber ? '' : `, from ${lineLabel(lineId)}`;
  return element(
    'div',
    { class: 'answer' },
    paragraph(label, 'label'),
    paragraph(answer.headline, isNumber ? 'headline' : 'headline none'),
    paragraph(reach + from, 'interval'),
    paragraph(why, 'why'),
  );
}

function identity(diagnosis: Diagnosis, bench: Bench, generatedAt: string | null): string {
  const { recording, inputs } = diagnosis;
  const lamp = [
    bench.lamp?.id,
    bench.lamp?.gas,
    bench.lamp?.pressurePa === undefined ? undefined : `${formatExact(bench.lamp.pressurePa)} Pa`,
    bench.lamp?.gasTemperatureK === undefined
      ? undefined
      : `gas at ${formatExact(bench.lamp.gasTemperatureK)} K`,
  ].filter((part) => part !== undefined);
  const range = `${formatAtPlace(recording.firstNm, -1)} to ${formatAtPlace(recording.lastNm, -1)} nm in ${recording.medium}, ${formatAtPlace(recording.pointCount, 0)} points`;
  return factList(
    [
      ['Recording', text(recording.name)],
      ['Range', text(range)],
      ['Lamp', lamp.length === 0 ? 'not stated' : text(lamp.join(', '))],
      ['Bench', text(inputs.bench ?? bench.name ?? 'not stated')],
      ['Report made', text(generatedAt ?? 'time not stated')],
    ],
    'identity',
  );
}
