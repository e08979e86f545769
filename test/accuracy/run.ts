/**
 * `npm run accuracy [section ...] [--draws N]`: how near the truth the program comes, measured on data whose truth is
 * certified or known. Nothing is asserted here; the test suite holds the limits.
 */
import { coverageTable, jointTable } from './coverage.ts';
import { strdTable } from './strd.ts';
import { trapTable } from './traps.ts';

/** A section is a name, what it shows, and its table: the head row first. */
const sections: readonly (readonly [name: string, title: string, rows: (drawCount: number) => string[][]])[] =
  [
    [
      'strd',
      'NIST Statistical Reference Datasets: digits that agree with the certified values',
      () => strdTable(),
    ],
    [
      'coverage',
      'Simulated recordings: does the 95 % interval hold the truth, and is it as sharp as can be?',
      coverageTable,
    ],
    ['joint', 'The joint fit beside a fit line by line', jointTable],
    ['traps', 'Ways to be fooled', trapTable],
  ];

const { names, drawCount } = readArguments(process.argv.slice(2));
for (const [name, title, rows] of sections) {
  if (names.length > 0 && !names.includes(name)) continue;
  console.log(`\n${title}`);
  print(rows(drawCount));
}

function readArguments(given: readonly string[]): { names: string[]; drawCount: number } {
  const at = given.indexOf('--draws');
  const count = at < 0 ? 400 : Number(given[at + 1]);
  const wanted = given.filter((_, index) => at < 0 || (index !== at && index !== at + 1));
  const unknown = wanted.filter((name) => sections.every(([known]) => known !== name));
  if (!(Number.isInteger(count) && count > 0) || unknown.length > 0) {
    console.error(`usage: npm run accuracy -- [${sections.map(([name]) => name).join('|')} ...] [--draws N]`);
    process.exit(2);
  }
  return { names: wanted, drawCount: count };
}

function print(rows: readonly (readonly string[])[]): void {
  // A row of one cell is a remark below the table.
  const widths = rows[0]!.map((_, column) =>
    Math.max(...rows.filter((row) => row.length > 1).map((row) => row[column]?.length ?? 0)),
  );
  for (const row of rows)
    console.log(`  ${row.map((cell, column) => cell.padEnd(widths[column]!)).join('  ')}`.trimEnd());
}
