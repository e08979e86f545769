import type { Bench } from '../bench/bench.ts';
import type { Note, Problem } from '../result/result.ts';
import { isOpticalRange, toNm, unitFromRange, unitInHeader } from './axis-unit.ts';
import { isCounting, isPixelHeader, isTimeHeader } from './choose-columns.ts';
import { recordingLimits } from './limits.ts';
import type { TextTable } from './read-table.ts';
import type { Understood, WavelengthUnit } from './recording.ts';
import { smoothRoundedAxis, type RoundedAxis } from './smooth-rounded-axis.ts';

export interface Axis {
  /** nm, strictly increasing. */
  readonly wavelengthNm: Float64Array;
  /** True when the rows of the file ran from long to short wavelengths. */
  readonly isReversed: boolean;
  readonly unit: Understood['axisUnit'];
  readonly unitFrom: Understood['axisUnitFrom'];
  /** Of the numbers as they stand in the file. */
  readonly order: Understood['order'];
  readonly medium: 'air' | 'vacuum';
  readonly notes: readonly Note[];
}

export type AxisFault = Pick<Problem, 'code' | 'expected' | 'found' | 'remedy'> & {
  readonly rowIndex: number | null;
};
export type AxisResult =
  { readonly ok: true; readonly value: Axis } | { readonly ok: false; readonly fault: AxisFault };

const fault = (rowIndex: number | null, facts: Omit<AxisFault, 'rowIndex'>): AxisResult => ({
  ok: false,
  fault: { rowIndex, ...facts },
});

/** Wavelengths in nm from the axis column, or from pixel numbers and the coefficients of the bench file. */
export function makeAxis(table: TextTable, bench: Bench): AxisResult {
  const { axis, layout, choice } = table;
  if (axis === null) return axisFromPixels(null, table.signal.length, bench);
  const header = choice.axisIndex < 0 ? '' : layout.headers[choice.axisIndex]!;
  if (isTimeHeader(header)) {
    return fault(null, {
      code: 'axis.implausible',
      expected: 'a wavelength column',
      found: `a time column ("${header}")`,
      remedy: 'Convert the scan time to wavelength first.',
    });
  }
  const broken = firstStepAgainst(axis, axis[axis.length - 1]! - axis[0]!);
  if (broken !== null) {
    const [now, before] = [axis[broken]!, axis[broken - 1]!];
    return fault(broken, {
      code: now === before ? 'axis.duplicate' : 'axis.not-monotonic',
      expected: 'wavelengths that run one way, each once',
      found: now === before ? `${String(now)} twice` : `${String(now)} after ${String(before)}`,
      remedy: 'Keep one recording in a file and remove repeated rows.',
    });
  }
  const declared = unitInHeader(header) ?? (header === '' ? unitInHeader(layout.headerLine) : null);
  const isPixels =
    bench.axis?.unit === undefined &&
    declared === null &&
    (isPixelHeader(header) || isCounting([...axis.subarray(0, 64)]));
  if (isPixels) return axisFromPixels(axis, axis.length, bench);
  return axisFromWavelengths(table, axis, { header, declared, bench });
}

function axisFromWavelengths(
  table: TextTable,
  axis: Float64Array,
  { header, declared, bench }: { header: string; declared: WavelengthUnit | null; bench: Bench },
): AxisResult {
  const notes: Note[] = [];
  const [first, last] = [axis[0]!, axis[axis.length - 1]!];
  const guess = unitFromRange(first, last);
  const unit = bench.axis?.unit ?? declared ?? guess?.unit ?? null;
  const unitFrom = bench.axis?.unit !== undefined ? 'bench' : declared !== null ? 'header' : 'range';
  if (unit === null || Math.min(first, last) <= 0 || !isOpticalRange(toNm(first, unit), toNm(last, unit))) {
    const inUnit = unit === null ? '' : ` ${unit}`;
    const other =
      guess !== null && guess.unit !== unit
        ? ` It would fit ${guess.unit}: if so, set axis.unit in the bench file.`
        : '';
    return fault(null, {
      code: 'axis.implausible',
      expected: `wavelengths between ${String(recordingLimits.shortestNm)} and ${String(recordingLimits.longestNm)} nm`,
      found: `${String(Math.min(first, last))} to ${String(Math.max(first, last))}${inUnit}`,
      remedy: `Check that column ${String(table.choice.axisIndex + 1)} holds the wavelength and in which unit.${other}`,
    });
  }
  if (unitFrom === 'range' && guess?.rival) {
    notes.push({
      code: 'unit-ambiguous',
      text: `The axis was read as ${unit}; its numbers could also be ${guess.rival}. Set axis.unit in the bench file to settle it.`,
    });
  }
  const smooth = smoothRoundedAxis(axis, table.axisDecimalCount);
  if (smooth !== null) notes.push(roundedNote(smooth, unit, table.axisDecimalCount));
  const written = smooth?.axis ?? axis;
  const wavelengthNm = unit === 'nm' ? written : written.map((value) => toNm(value, unit));
  const isReversed = wavelengthNm[wavelengthNm.length - 1]! < wavelengthNm[0]!;
  const { medium, note } = mediumOf({ bench, unit, header });
  if (note !== null) notes.push(note);
  return {
    ok: true,
    value: {
      wavelengthNm: isReversed ? wavelengthNm.reverse() : wavelengthNm,
      isReversed,
      unit,
      unitFrom,
      order: last < first ? 'descending' : 'ascending',
      medium,
      notes,
    },
  };
}

function roundedNote(rounded: RoundedAxis, unit: WavelengthUnit, decimalCount: number): Note {
  const inDigits = (value: number): string => `${value.toFixed(decimalCount + 2)} ${unit}`;
  const seen =
    `The wavelengths are written in steps of ${String(rounded.roundingStep)} ${unit}, ` +
    `coarse beside the pixel step of ${inDigits(rounded.meanStep)}`;
  const change = `moving none by more than ${inDigits(rounded.largestChange)}`;
  const done: Record<RoundedAxis['method'], string> = {
    polynomial: `the rounding was smoothed by a polynomial of degree ${String(rounded.extent)}, ${change}`,
    neighbours: `the rounding was smoothed over ${String(rounded.extent)} pixels on each side, ${change}`,
    left: 'no smooth curve agrees with them, so they were left as written',
  };
  return { code: 'axis-rounded', text: `${seen}; ${done[rounded.method]}.` };
}

function mediumOf(known: { bench: Bench; unit: Understood['axisUnit']; header: string }): {
  medium: 'air' | 'vacuum';
  note: Note | null;
} {
  const said = known.bench.axis?.medium;
  if (said !== undefined) return { medium: said, note: null };
  if (known.unit === 'cm-1') {
    const text = 'Wavenumbers were taken as vacuum wavenumbers, so the wavelengths are in vacuum.';
    return { medium: 'vacuum', note: { code: 'medium-vacuum', text } };
  }
  if (/vac/.test(known.header)) {
    const text = `The wavelengths were taken as vacuum wavelengths, as the header "${known.header}" says.`;
    return { medium: 'vacuum', note: { code: 'medium-vacuum', text } };
  }
  const text =
    'The wavelengths were taken as wavelengths in air; set axis.medium in the bench file to settle it.';
  return { medium: 'air', note: { code: 'medium-assumed', text } };
}

/** nm = sum of coefficientsNm[k] * pixel^k, pixels from 0 (a column counted from 1 is taken one down). */
function axisFromPixels(pixels: Float64Array | null, count: number, bench: Bench): AxisResult {
  const coefficientsNm = bench.axis?.coefficientsNm;
  if (coefficientsNm === undefined) {
    const remedy =
      'Export the wavelength column too, or give axis.coefficientsNm (pixel number from 0 to nm) in the bench file.';
    return pixels === null
      ? fault(null, {
          code: 'table.one-column',
          expected: 'columns of wavelength and signal',
          found: 'one column of numbers',
          remedy,
        })
      : fault(null, {
          code: 'axis.missing',
          expected: 'wavelengths',
          found: `pixel numbers from ${String(Math.min(pixels[0]!, pixels[count - 1]!))} to ${String(Math.max(pixels[0]!, pixels[count - 1]!))}`,
          remedy,
        });
  }
  const [head, tail] = pixels === null ? [0, count - 1] : [pixels[0]!, pixels[count - 1]!];
  const offset = Math.min(head, tail) === 1 ? 1 : 0;
  const wavelengthNm = new Float64Array(count);
  for (let i = 0; i < count; i += 1) {
    const pixel = (pixels?.[i] ?? i) - (pixels === null ? 0 : offset);
    let nm = 0;
    for (let k = coefficientsNm.length - 1; k >= 0; k -= 1) nm = nm * pixel + coefficientsNm[k]!;
    wavelengthNm[i] = nm;
  }
  const broken = firstStepAgainst(wavelengthNm, wavelengthNm[1]! - wavelengthNm[0]!);
  const [first, last] = [wavelengthNm[0]!, wavelengthNm[count - 1]!];
  if (broken !== null || !isOpticalRange(first, last)) {
    return fault(null, {
      code: 'axis.implausible',
      expected: `coefficients in the bench file that give wavelengths between ${String(recordingLimits.shortestNm)} and ${String(recordingLimits.longestNm)} nm, running one way`,
      found:
        broken === null
          ? `${String(Math.min(first, last))} to ${String(Math.max(first, last))} nm`
          : `wavelengths that turn back at pixel ${String(broken)}`,
      remedy: 'Correct axis.coefficientsNm in the bench file.',
    });
  }
  const { medium, note } = mediumOf({ bench, unit: 'pixel', header: '' });
  const from = offset === 1 && pixels !== null ? 'counted from 1 in the file' : 'counted from 0';
  const isReversed = last < first;
  return {
    ok: true,
    value: {
      wavelengthNm: isReversed ? wavelengthNm.reverse() : wavelengthNm,
      isReversed,
      unit: 'pixel',
      unitFrom: 'bench',
      order: tail < head ? 'descending' : 'ascending',
      medium,
      notes: [
        {
          code: 'pixel-axis',
          text: `Wavelengths were computed from ${pixels === null ? 'the row number' : 'the pixel number'} (${from}) and the coefficients in the bench file.`,
        },
        ...(note === null ? [] : [note]),
      ],
    },
  };
}

/** Index of the first value that repeats the one before or steps against `way` (its sign counts); null if none. */
function firstStepAgainst(values: Float64Array, way: number): number | null {
  const direction = way >= 0 ? 1 : -1;
  for (let i = 1; i < values.length; i += 1) if (!((values[i]! - values[i - 1]!) * direction > 0)) return i;
  return null;
}
