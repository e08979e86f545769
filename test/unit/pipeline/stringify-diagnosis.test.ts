import { expect, test } from 'vitest';
import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import {
  stringifyDiagnosis,
  stringifyDiagnosisOnOneLine,
} from '../../../shared-core/pipeline/stringify-diagnosis.ts';
import { emptyParts, plainChoices } from '../../support/empty-parts.ts';

const diagnosis: Diagnosis = {
  schema: 'lampwright.diagnosis/1',
  program: { name: 'lampwright', version: '0.1.0' },
  recording: { name: 'a.csv', sha256: 'ab', pointCount: 9, firstNm: 400, lastNm: 408, medium: 'air' },
  inputs: {
    bench: null,
    dark: null,
    response: null,
    profile: null,
    mirror: null,
    source: null,
    through: null,
  },
  options: { upperLevels: [3, 4], leftOut: [], coverage: 0.95, deuterium: 'auto', ...plainChoices },
  axis: {
    status: 'not-found',
    offsetNm: null,
    offsetSigmaNm: null,
    stretch: null,
    stretchSigma: null,
    pivotNm: 500,
    matchedLines: [],
    text: '',
  },
  lines: [],
  temperature: {
    status: 'not-determined',
    kelvin: null,
    sigmaKelvin: null,
    lowKelvin: null,
    highKelvin: null,
    coverage: 0.95,
    chiSquare: null,
    degreesOfFreedom: null,
    effectiveDegreesOfFreedom: null,
    birgeRatio: null,
    widening: 1,
    responseCorrected: false,
    text: '',
  },
  electronDensity: {
    status: 'upper-limit',
    perCubicMetre: null,
    lowPerCubicMetre: null,
    highPerCubicMetre: 1.23456789012345e20,
    coverage: 0.95,
    line: null,
    text: '',
  },
  meaning: { kind: 'distribution-temperature', lowestEquilibratedLevel: null, text: '' },
  ...emptyParts,
  checks: [{ id: 'z', verdict: 'sound', facts: { b: 1 / 3, a: -0 }, text: '', remedy: '' }],
  budget: [],
  verdict: 'sound',
  verdictText: '',
  notes: [],
};

test('writes the keys in the order of the schema, whatever the order they came in', () => {
  const backwards = Object.fromEntries(Object.entries(diagnosis).reverse()) as unknown as Diagnosis;
  expect(stringifyDiagnosis(backwards)).toBe(stringifyDiagnosis(diagnosis));
  expect(Object.keys(JSON.parse(stringifyDiagnosis(backwards)) as object)[0]).toBe('schema');
});

test('rounds to 10 significant digits, and minus zero to zero', () => {
  const text = stringifyDiagnosis(diagnosis);
  expect(text).toContain('"b": 0.3333333333,');
  expect(text).toContain('"a": 0\n');
  expect(text).toContain('"highPerCubicMetre": 123456789000000000000');
});

test('gives what was rounded once the same text again', () => {
  const once = stringifyDiagnosis(diagnosis);
  expect(stringifyDiagnosis(JSON.parse(once) as Diagnosis)).toBe(once);
});

test('on one line says the same', () => {
  const line = stringifyDiagnosisOnOneLine(diagnosis);
  expect(line).not.toContain('\n');
  expect(JSON.stringify(JSON.parse(stringifyDiagnosis(diagnosis)))).toBe(line);
});

test.each([Number.NaN, Infinity])('throws for %s, which JSON cannot hold', (kelvin) => {
  const broken = { ...diagnosis, temperature: { ...diagnosis.temperature, kelvin } };
  expect(() => stringifyDiagnosis(broken)).toThrow(/kelvin/);
});
