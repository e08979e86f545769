import { describe, expect, test } from 'vitest';
import type { Bench } from '../../../shared-core/bench/bench.ts';
import { recordingLimits } from '../../../shared-core/recording/limits.ts';
import { readRecording } from '../../../shared-core/recording/read-recording.ts';
import { problemSentence, type Problem } from '../../../shared-core/result/result.ts';
import { textFile } from '../../support/text-file.ts';

function refuse(
  content: string | Uint8Array,
  options: { bench?: Bench; subject?: 'recording' | 'dark' } = {},
): Problem {
  const result = readRecording(textFile(content), options.bench ?? {}, options.subject);
  if (result.ok) throw new Error(`read as ${String(result.value.wavelengthNm.length)} points`);
  return result.problem;
}

const good = Array.from({ length: 20 }, (_, i) => `${(400 + i * 0.5).toFixed(1)},${String(100 + i)}`);
const withRow = (index: number, row: string): string =>
  `wavelength_nm,counts\n${good.map((line, i) => (i === index ? row : line)).join('\n')}\n`;
const bytes = (...values: number[]): Uint8Array => Uint8Array.from([...values, ...Array.from({ length: 100 }, (_, i) => i)]);

interface Case {
  readonly what: string;
  readonly content: string | Uint8Array;
  readonly bench?: Bench;
  readonly subject?: 'dark';
  readonly code: Problem['code'];
  readonly line: number | null;
  readonly sentence: string;
}

// The sentences are what people read: each was read over, and a changed one is to be read again.
const cases: readonly Case[] = [
  {
    what: 'an empty file',
    content: '',
    code: 'file.empty',
    line: null,
    sentence: 'Cannot use the recording "tube.csv": expected a table of numbers, found an empty file. Export the file again.',
  },
];

test.each(cases)('$what', ({ content, bench, subject, code, line, sentence }) => {
  const problem = refuse(content, { ...(bench && { bench }), ...(subject && { subject }) });
  expect({ code: problem.code, line: problem.lineNumber, file: problem.fileName }).toEqual({ code, line, file: 'tube.csv' });
  expect(problemSentence(problem)).toBe(sentence);
});
