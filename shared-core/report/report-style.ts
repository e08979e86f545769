/** The style sheet of the report: one constant, so that the content policy can name it by its hash. */
export const reportStyle = `
@page { size: auto; margin: 16mm 15mm 18mm; @bottom-right { content: "page " counter(page) " of " counter(pages); font: 7.5pt "DejaVu Sans", "Segoe UI", "Helvetica Neue", Arial, sans-serif; color: #585F67; } }
* { box-sizing: border-box; }
html { background: #E9E6DE; }
body { margin: 0 auto; max-width: 210mm; padding: 14mm 15mm; background: #FFFFFF; color: #1C2024; font: 9.5pt/1.45 "DejaVu Sans", "Segoe UI", "Helvetica Neue", Arial, sans-serif; font-variant-numeric: tabular-nums; overflow-wrap: break-word; }
h1, h2, p, dd, li, figcaption, th, td { overflow-wrap: anywhere; }
@media print { html, body { background: none; } body { max-width: none; padding: 0; } }
h1, h2, h3, p, dl, dd, ol, ul, table, figure { margin: 0; padding: 0; }
h1 { font-size: 17pt; line-height: 1.2; font-weight: 600; }
h2 { font-size: 11.5pt; font-weight: 600; margin: 7mm 0 2.5mm; padding-top: 1.6mm; border-top: 0.6pt solid #1C2024; break-after: avoid; }
h3 { font-size: 9.5pt; font-weight: 600; margin: 3mm 0 1mm; break-after: avoid; }
.masthead { display: flex; justify-content: space-between; gap: 8mm; font-size: 8pt; color: #585F67; margin-bottom: 5mm; }
.masthead strong { color: #0B6E69; letter-spacing: 0.06em; }
.subject { color: #585F67; margin-top: 1mm; }
.verdict { display: flex; gap: 3mm; align-items: flex-start; margin: 5mm 0 4mm; padding: 3.5mm 4mm; border: 0.8pt solid #1C2024; break-inside: avoid; }
.verdict svg { flex: none; margin-top: 0.6mm; }
.verdict-word { font-size: 14pt; font-weight: 600; line-height: 1.25; }
.answers { display: grid; grid-template-columns: 1fr 1fr; gap: 0 8mm; break-inside: avoid; }
.answer { border-left: 2.2pt solid #0B6E69; padding-left: 3.5mm; }
.answer .label { font-size: 8.5pt; color: #585F67; }
.answer .headline { font-size: 20pt; line-height: 1.3; font-weight: 600; white-space: nowrap; }
.answer .none { font-size: 15pt; line-height: 1.7; font-weight: 400; }
.answer .interval { font-size: 9.5pt; }
.answer .why { font-size: 8.5pt; color: #585F67; margin-top: 0.8mm; }
.meaning { margin-top: 3.5mm; break-inside: avoid; }
.warning { font-weight: 600; }
dl.facts { display: grid; grid-template-columns: 42mm 1fr; gap: 0.8mm 4mm; font-size: 8.5pt; }
dl.facts dt { color: #585F67; }
dl.facts.identity { margin-top: 5mm; padding-top: 2.5mm; border-top: 0.4pt solid #D9D6CE; }
.hash { font-family: "DejaVu Sans Mono", Consolas, "Liberation Mono", monospace; font-size: 7.2pt; }
figure { break-inside: avoid; margin: 1mm 0 2mm; }
figure svg { display: block; width: 100%; height: auto; }
figcaption { font-size: 8pt; color: #585F67; margin-top: 1.2mm; }
.line-figures { display: grid; grid-template-columns: repeat(3, 1fr); gap: 3mm 2mm; }
.line-figures { margin-bottom: 2mm; }
.line-figures figure { margin: 0; }
.line-figures figcaption { margin: 0.6mm 0 0 14mm; font-size: 7.5pt; }
table { border-collapse: collapse; width: 100%; font-size: 8pt; margin: 2mm 0; }
caption { text-align: left; color: #585F67; font-size: 8pt; padding-bottom: 1mm; }
thead { display: table-header-group; }
tr { break-inside: avoid; }
th, td { text-align: left; vertical-align: top; padding: 1mm 1.6mm 1mm 0; border-bottom: 0.4pt solid #D9D6CE; font-weight: 400; }
tbody th { min-width: 11mm; }
thead th { overflow-wrap: normal;  border-bottom: 0.6pt solid #1C2024; font-weight: 600; vertical-align: bottom; }
th.number, td.number { text-align: right; white-space: nowrap; }
td.reason { padding-left: 2mm; min-width: 30mm; }
tr.left-out { color: #585F67; }
.population-pair { display: flex; gap: 8mm; align-items: flex-start; break-inside: avoid; }
.population-pair figure { flex: 0 0 90mm; }
.population-pair table { font-size: 7.8pt; }
ul.check-list { list-style: none; }
ul.check-list li { display: grid; grid-template-columns: 5mm 29mm 1fr; gap: 1mm; padding: 1.3mm 0; border-bottom: 0.4pt solid #D9D6CE; break-inside: avoid; font-size: 8.8pt; }
ul.check-list svg { margin-top: 0.5mm; }
ul.check-list .word { font-weight: 600; }
ol.plain, ul.plain { padding-left: 5mm; font-size: 8.8pt; }
ol.plain li, ul.plain li { margin-bottom: 1.2mm; break-inside: avoid; }
.small { font-size: 8.2pt; }
ul.sources { padding-left: 5mm; font-size: 7.8pt; color: #585F67; }
ul.sources li { break-inside: avoid; }
.inputs { break-inside: avoid; }
.caution-columns { columns: 2; column-gap: 8mm; font-size: 7.8pt; line-height: 1.4; }
.caution-columns div { break-inside: avoid; margin-bottom: 2.4mm; }
.caution-columns h3 { margin: 0; font-size: 8pt; }
.caution-columns .because { margin-bottom: 0.6mm; }
.caution-columns ul { padding-left: 3.5mm; }
.because { color: #585F67; }
.standing { font-weight: 600; margin: 2mm 0; break-inside: avoid; break-after: avoid; }
.references { font-size: 7.5pt; margin-top: 2mm; }
.signatures { break-inside: avoid; margin-top: 8mm; }
.signatures p { font-size: 8.5pt; }
.signature-row { display: grid; grid-template-columns: 22mm 1fr 1fr 32mm; gap: 5mm; margin-top: 10mm; font-size: 8pt; color: #585F67; }
.signature-row span { border-top: 0.6pt solid #1C2024; padding-top: 0.8mm; }
.signature-row span:first-child { border-top-color: transparent; color: #1C2024; }
@media (max-width: 640px) { body { padding: 5mm; } .answers { grid-template-columns: 1fr; gap: 4mm; } .population-pair { flex-direction: column; } .population-pair figure { flex: none; } .line-figures { grid-template-columns: 1fr; } }
`;

/**
 * SHA-256 of `reportStyle`, base64: the only style a viewer may apply, and nothing may be loaded or run.
 *
 * @check test/unit/report/build-html-report.test.ts
 */
export const reportStyleHash = 'Ss6JyfW3hK9+wiYQTEufF/CU2iwX7D5lDJ4V18C0ikQ=';

export const reportPolicy = [
  "default-src 'none'",
  `style-src 'sha256-${reportStyleHash}'`,
  "base-uri 'none'",
  "form-action 'none'",
].join('; ');
