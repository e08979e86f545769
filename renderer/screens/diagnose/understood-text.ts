import type { Understood } from '../../../shared-core/recording/recording.ts';

const encodings: Record<Understood['encoding'], string> = {
  'utf-8': 'UTF-8',
  'utf-16le': 'UTF-16, low byte first',
  'utf-16be': 'UTF-16, high byte first',
  'latin-1': 'Latin-1',
};

const units: Record<Understood['axisUnit'], string> = {
  nm: 'nm',
  angstrom: 'ångström',
  um: 'µm',
  'cm-1': 'cm⁻¹',
  pixel: 'pixels',
};

const sources: Record<Understood['axisUnitFrom'], string> = {
  header: 'as its header says',
  range: 'by the range of the numbers',
  bench: 'as the bench file says',
};

/** What the reader made of the file, in one sentence that a person can check against it. */
export function understoodText(understood: Understood): string {
  const parts = [
    `${encodings[understood.encoding]} text`,
    understood.delimiter === 'blanks'
      ? 'columns parted by blanks'
      : `columns parted by ${understood.delimiter}s`,
    `decimal ${understood.decimalMark}`,
    plural(understood.headerLineCount, 'header line'),
    understood.axisColumn === null
      ? `signal in column ${String(understood.signalColumn)}`
      : `axis in column ${String(understood.axisColumn)}, signal in column ${String(understood.signalColumn)}`,
    `axis in ${units[understood.axisUnit]} (${sources[understood.axisUnitFrom]}), ${understood.order}`,
  ];
  const skipped =
    understood.skippedRowCount === 0
      ? ''
      : `; ${plural(understood.skippedRowCount, 'row')} without numbers skipped`;
  return `Read as ${parts.join(', ')}${skipped}.`;
}

const plural = (count: number, word: string): string =>
  `${count === 0 ? 'no' : String(count)} ${word}${count === 1 ? '' : 's'}`;
