import type { Check, DiagnosedLine, Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import { isTemperatureWithheld } from '../../shared-core/report/format-answer.ts';
import {
  chanceText,
  findingText,
  nothingFound,
  unassignedText,
} from '../../shared-core/report/impurities-section.ts';
import { formatPercent, formatSignificant, formatWithSigma } from '../../shared-core/text/format-number.ts';
import { alignColumns } from './align.ts';
import type { Work } from './plan-work.ts';
import { wrapLine } from './wrap.ts';
import { densityPhrase, temperaturePhrase } from './text-phrases.ts';

/** One diagnosis for people: the answer first, then the lines, then what speaks against it. */
export function sheetOf(diagnosis: Diagnosis, work: Work): string {
  return `${[
    ...answer(diagnosis),
    '',
    ...lineTable(diagnosis.lines),
    ...section('What stands behind it', crossChecks(diagnosis)),
    ...section(
      'Optical depth',
      diagnosis.opticalDepths.map(({ text }) => text),
    ),
    ...section('Checks', diagnosis.checks.filter((check) => check.verdict !== 'sound').map(checkText)),
    ...section('What limits it', [
      ...diagnosis.budget.map(budgetText),
      ...(diagnosis.monteCarlo === null || isTemperatureWithheld(diagnosis)
        ? []
        : [diagnosis.monteCarlo.text]),
    ]),
    ...section('What else is in the tube', whatElse(diagnosis)),
    ...section('Notes', [...diagnosis.notes, ...unusedBench(work)]),
  ].join('\n')}\n`;
}

/** "Temperature" and two blanks: where the second column begins. */
const labelWidth = 13;

function answer(diagnosis: Diagnosis): string[] {
  const { recording } = diagnosis;
  const range = `${recording.firstNm.toFixed(1)} to ${recording.lastNm.toFixed(1)} nm`;
  const rows: (readonly [string, string])[] = [
    [
      'Recording',
      `${recording.name}, ${String(recording.pointCount)} points, ${range} in ${recording.medium}`,
    ],
    ['Verdict', withText(diagnosis.verdict, diagnosis.verdictText)],
    ['Temperature', withText(temperaturePhrase(diagnosis), diagnosis.temperature.text)],
    ['Density', withText(densityPhrase(diagnosis), diagnosis.electronDensity.text)],
    ['Meaning', diagnosis.meaning.text],
    ['Axis', diagnosis.axis.text],
  ];
  return alignColumns(rows, ['left', 'left']).flatMap((row) => wrapLine(row, labelWidth));
}

/** The short answer, then its sentence, which may begin with the very same words. */
function withText(short: string, text: string): string {
  if (text === '') return short;
  if (text.toLowerCase().startsWith(short.toLowerCase())) return text;
  return `${short}. ${text.charAt(0).toUpperCase()}${text.slice(1)}`;
}

function lineTable(lines: readonly DiagnosedLine[]): string[] {
  if (lines.length === 0) return ['No lines.'];
  const unit = lines[0]?.areaUnit ?? 'counts';
  const head = ['Line', 'nm', `area / ${unit}`, 'S/N', 'chi2', 'used', 'why not'];
  const rows = lines.map((line) => [
    line.id,
    line.centreNm === null ? '-' : line.centreNm.toFixed(3),
    formatWithSigma(line.area, line.areaSigma, 'ascii'),
    formatSignificant(line.signalToNoise, 2, 'ascii'),
    formatSignificant(line.reducedChiSquare, 2, 'ascii'),
    line.used ? 'yes' : 'no',
    line.reasons.join('; '),
  ]);
  return alignColumns([head, ...rows], ['left', 'right', 'right', 'right', 'right', 'left', 'left']);
}

const section = (title: string, lines: readonly string[]): string[] =>
  lines.length === 0 ? [] : ['', title, ...lines.flatMap((line) => wrapLine(`  ${line}`, 6))];

function crossChecks(diagnosis: Diagnosis): string[] {
  const { equilibrium, selfAbsorption, deuterium, gasTemperature, companions } = diagnosis;
  return [
    equilibrium.text,
    equilibrium.saha.text,
    equilibrium.seriesLimit.text,
    selfAbsorption.text,
    deuterium.text,
    gasTemperature.text,
    diagnosis.instrumentProfile?.text ?? '',
    ...companions.map(({ text }) => text),
  ].filter((text) => text !== '');
}

const checkText = (check: Check): string =>
  `${check.verdict}: ${check.text}${check.remedy === '' ? '' : ` ${check.remedy}`}`;

const budgetText = (part: Diagnosis['budget'][number]): string =>
  `${formatPercent(part.share, 0, 'ascii').padStart(5)}  ${part.source}, ${formatSignificant(part.sigmaKelvin, 2, 'ascii')} K. ${part.remedy}`.trimEnd();

function whatElse(diagnosis: Diagnosis): string[] {
  const { impurities, benchFindings } = diagnosis;
  return [
    ...(impurities.length === 0 ? [nothingFound(diagnosis)] : []),
    ...impurities.map(
      (found) =>
        `${found.emitter}: ${found.meaning} (${found.confidence}; ${found.evidence}; signal to noise ${formatSignificant(found.signalToNoise, 2, 'ascii')}; by chance ${chanceText(found, 'ascii')})`,
    ),
    ...benchFindings.map((finding) => `${finding.title} (${finding.confidence}). ${findingText(finding)}`),
    ...[unassignedText(diagnosis, 'ascii')].filter((line) => line !== ''),
  ];
}

const unusedBench = (work: Work): string[] =>
  work.unusedBench === null ? [] : [`"${work.unusedBench}" was not used; give it with --bench.`];
