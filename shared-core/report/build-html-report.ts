import type { Bench } from '../bench/bench.ts';
import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import type { Figures } from '../diagnosis/figures.ts';
import type { Caution } from '../safety/cautions.ts';
import { answerSection } from './answer-section.ts';
import { evidenceSections } from './evidence-sections.ts';
import { paragraph, text } from './html.ts';
import { recordSections } from './record-sections.ts';
import { reportPolicy, reportStyle } from './report-style.ts';

export interface ReportInput {
  readonly diagnosis: Diagnosis;
  readonly figures: Figures;
  readonly cautions: readonly Caution[];
  /** The bench as described; lamp and instrument are named from it. */
  readonly bench?: Bench;
  /** When the report was made, as it shall be printed; null leaves it unstated. */
  readonly generatedAt: string | null;
}

/**
 * The report: one HTML document that stands alone, prints on A4 and letter, runs nothing and loads nothing.
 * Pure text of its input: the same input gives the same bytes.
 */
export function buildHtmlReport(input: ReportInput): string {
  const { diagnosis, figures, cautions, generatedAt } = input;
  const bench = input.bench ?? {};
  const lamp = bench.lamp?.id;
  const benchName = diagnosis.inputs.bench ?? bench.name;
  const subject = [
    ...(lamp === undefined ? [] : [`Lamp ${lamp}`]),
    ...(benchName === undefined ? [] : [benchName]),
    `recording ${diagnosis.recording.name}`,
  ].join(', ');
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${text(reportPolicy).replaceAll('&#39;', "'")}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="referrer" content="no-referrer">
<meta name="color-scheme" content="light">
<title>${text(`Lamp report: ${diagnosis.recording.name}`)}</title>
<style>${reportStyle}</style>
</head>
<body>
<header>
<div class="masthead"><span><strong>LAMPWRIGHT</strong> report on one lamp recording</span><span>${text(generatedAt ?? '')}</span></div>
<h1>Temperature and electron density of a lamp</h1>
${paragraph(subject, 'subject')}
</header>
<main>
${answerSection(diagnosis, bench, generatedAt)}
${evidenceSections(diagnosis, figures)}${recordSections(diagnosis, bench, cautions)}</main>
</body>
</html>
`;
}
