import { unitInHeader } from './axis-unit.ts';
import { mostlyOneWay, type Layout } from './sniff-layout.ts';

export interface ColumnChoice {
  /** From 0; -1 when the file holds signal only. */
  readonly axisIndex: number;
  readonly signalIndex: number;
  /** Relative uncertainty of a response table; -1 when there is none or none was asked for. */
  readonly uncertaintyIndex: number;
  readonly othersIgnored: readonly number[];
}

export type ColumnsFor = 'recording' | 'dark' | 'response';

const AXIS_WORDS = /wave|lambda|λ|(?<![a-z])wl(?![a-z])|x[ -]?axis|pixel|(?<![a-z])px(?![a-z])/;
const PIXEL_WORDS = /pixel|(?<![a-z])px(?![a-z])|index|(?<![a-z])(row|no|nr|point)(?![a-z])/;
const SIGNAL_WORDS =
  /intens|count|signal|flux|irradiance|radiance|amplitude|power|spectrum|scope|sample|(?<![a-z])(adu|dn)(?![a-z])/;
const RESPONSE_WORDS = /respons|sensitiv|efficien|throughput/;
const DARK_WORDS = /dark|background|(?<![a-z])bg(?![a-z])/;
const OTHER_WORDS = /dark|background|(?<![a-z])bg(?![a-z])|reference|baseline/;
const UNCERTAINTY_WORDS = /uncert|sigma|error|(?<![a-z])(std|stdev|sd|err|unc|u)(?![a-z])|deviation/;

/** Picks the axis (a header that says so, else the first monotonic column) and the signal that follows it. */
export function chooseColumns(layout: Layout, wanted: ColumnsFor): ColumnChoice {
  const { columnCount, headers, sampleColumns } = layout;
  if (columnCount === 1) return { axisIndex: -1, signalIndex: 0, uncertaintyIndex: -1, othersIgnored: [] };
  const all = Array.from({ length: columnCount }, (_, i) => i);
  const values = all.map((i) => sampleColumns[i]!.filter((value) => value !== null));
  const goesOneWay = all.map((i) => values[i]!.length > 1 && mostlyOneWay(values[i]!));
  const axisIndex = chooseAxis(layout, all, goesOneWay);
  const rest = [...all.filter((i) => i > axisIndex), ...all.filter((i) => i < axisIndex)].filter((i) =>
    values[i]!.some((value) => Number.isFinite(value)),
  );
  const header = (i: number): string => headers[i]!;
  const uncertaintyNamed = rest.find((i) => UNCERTAINTY_WORDS.test(header(i))) ?? -1;
  const named = wanted === 'dark' ? DARK_WORDS : wanted === 'response' ? RESPONSE_WORDS : SIGNAL_WORDS;
  const isOther = (i: number): boolean =>
    UNCERTAINTY_WORDS.test(header(i)) ||
    PIXEL_WORDS.test(header(i)) ||
    (wanted !== 'dark' && OTHER_WORDS.test(header(i)));
  const signalIndex =
    rest.find((i) => named.test(header(i)) && !isOther(i)) ??
    rest.find((i) => SIGNAL_WORDS.test(header(i)) && !isOther(i)) ??
    rest.find((i) => !isOther(i) && !(isCounting(sampleColumns[i]!) && rest.length > 1)) ??
    rest[0] ??
    (axisIndex === 0 ? 1 : 0);
  const next =
    uncertaintyNamed === -1 && columnCount === 3 ? rest.find((i) => i > signalIndex) : uncertaintyNamed;
  const uncertaintyIndex = wanted === 'response' && next !== signalIndex ? (next ?? -1) : -1;
  const used = [axisIndex, signalIndex, uncertaintyIndex];
  return { axisIndex, signalIndex, uncertaintyIndex, othersIgnored: all.filter((i) => !used.includes(i)) };
}

function chooseAxis(layout: Layout, all: readonly number[], goesOneWay: readonly boolean[]): number {
  const { headers, sampleColumns, columnCount } = layout;
  const isPixel = (i: number): boolean => PIXEL_WORDS.test(headers[i]!) || isCounting(sampleColumns[i]!);
  const isNamed = (i: number): boolean =>
    AXIS_WORDS.test(headers[i]!) || (unitInHeader(headers[i]!) !== null && !SIGNAL_WORDS.test(headers[i]!));
  const named = all.find((i) => isNamed(i) && !isPixel(i)) ?? all.find(isNamed);
  if (named !== undefined) return named;
  // A counting column before a wavelength column is only the pixel number; before a signal it is the axis.
  if (columnCount > 2) {
    const notCounting = all.find((i) => goesOneWay[i] && !isPixel(i) && i > 0 && isPixel(0));
    if (notCounting !== undefined && isStrict(sampleColumns[notCounting]!)) return notCounting;
  }
  return all.find((i) => goesOneWay[i]) ?? 0;
}

/** 0, 1, 2, … or 1, 2, 3, …: pixel numbers, or row numbers. */
export function isCounting(values: readonly (number | null)[]): boolean {
  const first = values[0];
  if (values.length < 3 || (first !== 0 && first !== 1)) return false;
  return values.every((value, i) => value === first + i);
}

function isStrict(values: readonly (number | null)[]): boolean {
  const direction = Math.sign((values[1] ?? 0) - (values[0] ?? 0));
  return (
    direction !== 0 &&
    values.every(
      (value, i) => i === 0 || (value !== null && Math.sign(value - (values[i - 1] ?? value)) === direction),
    )
  );
}

export function isPixelHeader(header: string): boolean {
  return PIXEL_WORDS.test(header) && unitInHeader(header) === null;
}

export function isTimeHeader(header: string): boolean {
  return (
    /(?<![a-z])(time|seconds|second|sec|ms|min|minutes)(?![a-z])/.test(header) &&
    unitInHeader(header) === null
  );
}
