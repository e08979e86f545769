import { expect, test } from 'vitest';
import {
  makeRecording,
  plainTable,
  type RecordingParts,
} from '../../../shared-core/recording/make-recording.ts';

const parts = (over: Partial<RecordingParts> = {}): RecordingParts => ({
  name: 'tube.csv',
  sha256: 'ab',
  wavelengthNm: Float64Array.from({ length: 8 }, (_, i) => 400 + i),
  signal: new Float64Array(8).fill(5),
  medium: 'air',
  ...over,
});

test('eight ascending points make a recording', () => {
  const result = makeRecording(parts());
  expect(result).toMatchObject({
    ok: true,
    value: { name: 'tube.csv', sha256: 'ab', medium: 'air', understood: plainTable, notes: [] },
  });
});

const changed = (index: number, value: number): Float64Array =>
  Float64Array.from({ length: 8 }, (_, i) => (i === index ? value : 400 + i));

test.each([
  ['table.column-count', { signal: new Float64Array(7) }, null],
  ['table.too-few-rows', { wavelengthNm: new Float64Array([400]), signal: new Float64Array([1]) }, null],
  ['table.not-finite', { wavelengthNm: changed(3, NaN) }, 103],
  ['table.not-finite', { signal: changed(4, Infinity) }, 104],
  ['axis.duplicate', { wavelengthNm: changed(5, 404) }, 105],
  ['axis.not-monotonic', { wavelengthNm: changed(5, 403.5) }, 105],
] as const)('%s is refused', (code, over, lineNumber) => {
  const result = makeRecording(parts({ ...over, lineOf: (pointIndex) => 100 + pointIndex, subject: 'dark' }));
  expect(result).toMatchObject({
    ok: false,
    problem: { code, lineNumber, fileName: 'tube.csv', subject: 'dark' },
  });
});

test('a recording that came from no file has no file name in its problem', () => {
  const result = makeRecording(parts({ name: '', signal: new Float64Array(0) }));
  expect(result).toMatchObject({
    ok: false,
    problem: { fileName: null, lineNumber: null, subject: 'recording' },
  });
});
