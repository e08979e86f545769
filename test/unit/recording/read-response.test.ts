import { describe, expect, test } from 'vitest';
import { readResponse } from '../../../shared-core/recording/read-response.ts';
import type { ResponseTable } from '../../../shared-core/recording/recording.ts';
import { problemSentence, type Problem } from '../../../shared-core/result/result.ts';
import { textFile } from '../../support/text-file.ts';

function read(text: string): ResponseTable {
  const result = readResponse(textFile(text, 'response.csv'), {});
  if (!result.ok) throw new Error(problemSentence(result.problem));
  return result.value;
}

function refuse(text: string): Problem {
  const result = readResponse(textFile(text, 'response.csv'), {});
  if (result.ok) throw new Error('read');
  return result.problem;
}

describe('a response table', () => {
  test('of two columns has no uncertainty', () => {
    const table = read('wavelength_nm,response\n400,0.5\n500,1\n700,0.25\n');
    expect([...table.wavelengthNm]).toEqual([400, 500, 700]);
    expect([...table.response]).toEqual([0.5, 1, 0.25]);
    expect(table.relativeSigma).toBeNull();
    expect(table).toMatchObject({ name: 'response.csv', sha256: '0'.repeat(64) });
  });

  test.each([
    ['a header', 'wavelength (nm),response,relative standard uncertainty\n400,0.5,0.03\n500,1,0.02\n'],
    ['no header', '400,0.5,0.03\n500,1,0.02\n'],
    ['percent in the header', 'nm;sensitivity;u (%)\n400;0,5;3\n500;1;2\n'],
    ['the uncertainty before the response', 'nm;u;response\n400;0,03;0,5\n500;0,02;1\n'],
    ['falling angstrom', 'Å\tefficiency\tsigma\n5000\t1\t0.02\n4000\t0.5\t0.03\n'],
  ])('takes its uncertainty from the right column with %s', (_, text) => {
    const table = read(text);
    expect([...table.wavelengthNm]).toEqual([400, 500]);
    expect([...table.response]).toEqual([0.5, 1]);
    expect([...(table.relativeSigma ?? [])]).toEqual([0.03, 0.02]);
  });

  test('takes no unit from the bench file, which speaks of recordings', () => {
    const result = readResponse(textFile('400,0.5\n500,1\n'), { axis: { unit: 'angstrom' } });
    expect(result.ok && [...result.value.wavelengthNm]).toEqual([400, 500]);
  });

  test('of thousands of rows keeps every uncertainty', () => {
    const rows = Array.from(
      { length: 5000 },
      (_, i) => `${String(300 + i / 10)},${String(1 + i)},0.0${String(1 + (i % 9))}`,
    );
    const table = read(`nm,response,u\n${rows.join('\n')}\n`);
    expect(table.response[4999]).toBe(5000);
    expect(table.relativeSigma?.length).toBe(5000);
    expect(table.relativeSigma?.[4999]).toBe(0.05);
  });
});

describe('what is wrong with a response table', () => {
  test.each([
    ['an empty file', '', 'file.empty', null],
    ['one column', 'response\n1\n2\n3\n', 'table.one-column', null],
    ['one row', 'nm,response\n400,1\n', 'table.too-few-rows', null],
    ['a response of zero', 'nm,response\n400,1\n500,0\n', 'response.bad-value', 3],
    ['a negative response', 'nm,response\n400,-1\n500,1\n', 'response.bad-value', 2],
    ['an uncertainty above 1', 'nm,response,u\n400,1,0.02\n500,1,3\n', 'response.bad-value', 3],
    ['a negative uncertainty', 'nm,response,u\n400,1,-0.02\n500,1,0.02\n', 'response.bad-value', 2],
    ['an uncertainty above 100 %', 'nm,response,u (%)\n400,1,2\n500,1,300\n', 'response.bad-value', 3],
    ['a wavelength twice', 'nm,response\n400,1\n400,2\n500,1\n', 'axis.duplicate', 3],
    ['NaN', 'nm,response\n400,1\n450,NaN\n500,1\n', 'table.not-finite', 3],
  ] as const)('%s', (_, text, code, lineNumber) => {
    expect(refuse(text)).toMatchObject({
      code,
      lineNumber,
      fileName: 'response.csv',
      subject: 'response table',
    });
  });

  test('is said in one sentence', () => {
    expect(problemSentence(refuse('nm,response\n400,1\n500,0\n'))).toBe(
      'Cannot use the response table "response.csv", line 3: expected a response above 0, found 0. Leave out the wavelengths at which the spectrometer sees nothing.',
    );
    expect(problemSentence(refuse('nm,response,u\n400,1,0.02\n500,1,3\n'))).toBe(
      'Cannot use the response table "response.csv", line 3: expected a relative standard uncertainty from 0 to 1, found 3. Divide an absolute uncertainty by the response; mark one in percent with % in the header.',
    );
  });
});
