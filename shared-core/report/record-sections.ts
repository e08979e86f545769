import type { Bench } from '../bench/bench.ts';
import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import { type Caution, notASafetyDevice } from '../safety/cautions.ts';
import { safetyReferences } from '../safety/references.ts';
import { formatDensity, notDetermined, temperatureAnswer } from './format-answer.ts';
import { formatExact, formatPercent } from '../text/format-number.ts';
import { factList, paragraph, section, text } from './html.ts';
import { lineLabel } from './line-label.ts';
import { methodsOf } from './methods.ts';

/** What makes the report a record: notes, methods, inputs with their hashes, cautions, signatures. */
export function recordSections(diagnosis: Diagnosis, bench: Bench, cautions: readonly Caution[]): string {
  return [
    section('notes', 'Notes', listOf(diagnosis.notes)),
    methodsSection(diagnosis),
    inputsSection(diagnosis, bench),
    cautionsSection(cautions),
    signatures(diagnosis),
  ].join('');
}

function methodsSection(diagnosis: Diagnosis): string {
  const methods = methodsOf(diagnosis).map(
    ({ quantity, text: how, sources }) =>
      `<h3>${text(quantity)}</h3>${paragraph(how, 'small')}<ul class="sources">${sources
        .map((source) => `<li>${text(source)}</li>`)
        .join('')}</ul>`,
  );
  return section('methods', 'How each number was obtained', ...methods);
}

function inputsSection(diagnosis: Diagnosis, bench: Bench): string {
  const { program, recording, inputs, options } = diagnosis;
  const file = (input: { readonly name: string; readonly sha256: string } | null) =>
    input === null
      ? 'none given'
      : `${text(input.name)}<br><span class="hash">SHA-256 ${text(input.sha256)}</span>`;
  const { instrument } = bench;
  const width =
    instrument?.fwhmNm === undefined
      ? null
      : `${formatExact(instrument.fwhmNm)} nm${instrument.fwhmSigmaNm === undefined ? '' : ` ± ${formatExact(instrument.fwhmSigmaNm)} nm`}`;
  return section(
    'inputs',
    'Program, inputs and settings',
    factList([
      ['Program', text(`${program.name} ${program.version}`)],
      ['Recording', file(recording)],
      ['Dark', file(inputs.dark)],
      ['Response', file(inputs.response)],
      ['Reference lamp', inputs.profile === null ? null : file(inputs.profile)],
      ['With mirror', inputs.mirror === null ? null : file(inputs.mirror)],
      ['Source alone', inputs.source === null ? null : file(inputs.source)],
      ['Source through the tube', inputs.through === null ? null : file(inputs.through)],
      ['Response is per', inputs.response === null ? null : text(inputs.response.per)],
      ['Bench', text(inputs.bench ?? 'none given')],
      ['Instrument width', width === null ? null : text(width)],
      ['Upper levels', text(options.upperLevels.map((level) => formatExact(level)).join(', '))],
      ['Left out by hand', text(options.leftOut.map(lineLabel).join(', ') || 'none')],
      ['Deuterium', text(options.deuterium)],
      ['Coverage of intervals', text(formatPercent(options.coverage, 1))],
    ]),
  );
}

function cautionsSection(cautions: readonly Caution[]): string {
  const hazards = [...new Set(cautions.map(({ hazard }) => hazard))];
  const groups = hazards.map((hazard) => {
    const group = cautions.filter((caution) => caution.hazard === hazard);
    const reasons = [...new Set(group.map(({ appliesBecause }) => appliesBecause))].join('; ');
    const items = group.map((caution) => `<li>${text(caution.text)}</li>`).join('');
    return `<div><h3>${text(capitalised(hazard))}</h3>${paragraph(reasons, 'because')}<ul>${items}</ul></div>`;
  });
  const references = safetyReferences.map(({ name, covers }) => `${name} (${covers})`).join('; ');
  return section(
    'cautions',
    'Cautions for this bench',
    paragraph(notASafetyDevice, 'standing'),
    groups.length === 0 ? '' : `<div class="caution-columns">${groups.join('')}</div>`,
    paragraph(`Where the rules are written, among others: ${references}.`, 'references because'),
  );
}

function capitalised(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}

/** What is signed is named once more, so that the page cannot be put under another recording. */
function signatures(diagnosis: Diagnosis): string {
  const { recording, verdict, temperature, electronDensity } = diagnosis;
  const row = (role: string) =>
    `<div class="signature-row"><span>${text(role)}</span><span>name</span><span>signature</span><span>date</span></div>`;
  const kelvin = temperatureAnswer(diagnosis);
  const isBare = temperature.responseCorrected || kelvin === notDetermined;
  return `<section class="signatures" aria-labelledby="signatures"><h2 id="signatures">Signatures</h2>${factList(
    [
      ['Recording', `${text(recording.name)}<br><span class="hash">SHA-256 ${text(recording.sha256)}</span>`],
      ['Verdict', text(verdict)],
      ['Temperature', text(isBare ? kelvin : `${kelvin}, not corrected for the response`)],
      ['Electron density', text(formatDensity(electronDensity))],
    ],
  )}${['Measured', 'Checked', 'Approved'].map(row).join('')}</section>\n`;
}

function listOf(items: readonly string[]): string {
  return items.length === 0
    ? ''
    : `<ul class="plain">${items.map((item) => `<li>${text(item)}</li>`).join('')}</ul>`;
}
