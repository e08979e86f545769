import { beforeAll, describe, expect, test } from 'vitest';
import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import { diagnoseFiles } from '../../shared-core/pipeline/diagnose-files.ts';
import { simulateRecording } from '../../shared-core/simulation/simulate-recording.ts';
import { knownBench } from '../support/diagnose-simulated.ts';

const encoder = new TextEncoder();
const file = (name: string, text: string) => ({ name, bytes: encoder.encode(text), sha256: '0'.repeat(64) });
const bench = file('bench.json', JSON.stringify({ schema: 'lampwright.bench/1', ...knownBench }));

function diagnoseText(text: string): Diagnosis {
  const result = diagnoseFiles({
    recording: file('t07.csv', text),
    dark: null,
    response: null,
    bench,
    options: { leftOut: [] },
    lineTable: [],
    programVersion: '0.0.0',
  });
  if (!result.ok) throw new Error(JSON.stringify(result.problem));
  return result.value.diagnosis;
}

const { wavelengthNm, signal } = simulateRecording({
  bench: knownBench,
  kelvin: 6400,
  electronsPerCubicMetre: 3e20,
  seed: 77,
  continuumElectrons: 40,
});
const nm = [...wavelengthNm].map((value) => value.toFixed(4));
const rows = (cells: (index: number) => string): string => nm.map((_, index) => cells(index)).join('\n');
const plainText = `wavelength_nm,signal_counts\n${rows((i) => `${nm[i]!},${String(signal[i])}`)}\n`;

/** What the numbers are, without what names the file or tells how it was read. */
const numbers = ({ lines, temperature, electronDensity, axis, budget, verdict }: Diagnosis) => ({
  lines,
  temperature,
  electronDensity,
  axis,
  budget,
  verdict,
});

describe('the same recording in another layout', () => {
  let plain: Diagnosis;
  beforeAll(() => {
    plain = diagnoseText(plainText);
  });

  const header = Array.from(
    { length: 12 },
    (_, i) => `Setting ${String(i + 1)}:\tvalue ${String(i * 3)}`,
  ).join('\n');
  const layouts: Record<string, string> = {
    'decimal commas with semicolons': `Wellenlänge (nm);Signal\n${rows((i) => `${nm[i]!.replace('.', ',')};${String(signal[i])},0`)}\n`,
    'tabs under a 13-line header': `${header}\n>>> data\n${rows((i) => `${nm[i]!}\t${String(signal[i])}`)}\n`,
    'runs of blanks with CRLF': rows((i) => `  ${nm[i]!}    ${String(signal[i])}`).replaceAll('\n', '\r\n'),
    'descending nanometres': `wavelength_nm,signal_counts\n${rows((i) => `${nm[nm.length - 1 - i]!},${String(signal[nm.length - 1 - i])}`)}\n`,
  };
  test.each(Object.entries(layouts))('%s: identical to the last digit', (_, text) => {
    expect(numbers(diagnoseText(text))).toEqual(numbers(plain));
  });

  test('descending angstroms: the same to rounding of the unit', () => {
    const text = `Wavelength (Angstrom),Counts\n${rows((i) => {
      const from = nm.length - 1 - i;
      return `${(Number(nm[from]) * 10).toFixed(3)},${String(signal[from])}`;
    })}\n`;
    const found = diagnoseText(text);
    expect(Math.abs(found.temperature.kelvin! / plain.temperature.kelvin! - 1)).toBeLessThan(1e-8);
    expect(
      Math.abs(found.electronDensity.perCubicMetre! / plain.electronDensity.perCubicMetre! - 1),
    ).toBeLessThan(1e-7);
    expect(found.verdict).toBe(plain.verdict);
  });

  test('an axis 1.2 nm off with 0.3 % stretch: found, said, and the same numbers within a twentieth of sigma', () => {
    const wrong = (value: string): string => {
      const true_ = Number(value);
      return (true_ + 1.2 + 0.003 * (true_ - 500)).toFixed(4);
    };
    const found = diagnoseText(`nm,counts\n${rows((i) => `${wrong(nm[i]!)},${String(signal[i])}`)}\n`);
    const { temperature, axis } = found;
    expect(axis.status).toBe('registered');
    expect(axis.offsetNm!).toBeCloseTo(-1.2 / 1.003, 2);
    expect(axis.stretch!).toBeCloseTo(1 / 1.003 - 1, 4);
    expect(Math.abs(temperature.kelvin! - plain.temperature.kelvin!)).toBeLessThan(
      0.05 * plain.temperature.sigmaKelvin!,
    );
    expect(Math.abs(temperature.sigmaKelvin! / plain.temperature.sigmaKelvin! - 1)).toBeLessThan(0.01);
    for (const [index, line] of found.lines.entries()) {
      expect(Math.abs(line.centreNm! - plain.lines[index]!.centreNm!)).toBeLessThan(0.005);
      expect(Math.abs(line.area! - plain.lines[index]!.area!)).toBeLessThan(0.1 * line.areaSigma!);
    }
    expect(found.checks.find(({ id }) => id === 'axis-shift')?.text).toContain('1.16 nm too high');
    expect(found.verdict).toBe(plain.verdict);
  });
});
