import { describe, expect, test } from 'vitest';
import { benchTemplate, defaultBench } from '../../../shared-core/bench/bench-template.ts';
import { knownFields } from '../../../shared-core/bench/known-fields.ts';
import { readBench } from '../../../shared-core/bench/read-bench.ts';
import { createRandom } from '../../../shared-core/numeric/random.ts';
import { problemSentence, type Problem } from '../../../shared-core/result/result.ts';
import { latin1, textFile, utf16 } from '../../support/text-file.ts';

function refuse(text: string): Problem {
  const result = readBench(textFile(text, 'bench.json'));
  if (result.ok) throw new Error(`read as ${JSON.stringify(result.value)}`);
  return result.problem;
}

describe('a bench file is read', () => {
  test('with every field, and the template holds every field there is', () => {
    expect(readBench(JSON.stringify(benchTemplate))).toEqual({ ok: true, value: benchTemplate });
    const fieldsIn = (value: object, prefix: string): string[] =>
      Object.entries(value).flatMap(([name, inner]: [string, unknown]) => [
        prefix + name,
        ...(typeof inner === 'object' && inner !== null && !Array.isArray(inner)
          ? fieldsIn(inner, `${prefix}${name}.`)
          : []),
      ]);
    expect(fieldsIn(benchTemplate, '').toSorted()).toEqual(knownFields.toSorted());
  });

  test('with none', () => {
    expect(readBench('{}')).toEqual({ ok: true, value: defaultBench });
  });

  test.each([
    ['a byte-order mark', '\ufeff{"name": "Prüfplatz Å"}'],
    ['UTF-16', utf16('{"name": "Prüfplatz Å"}', 'le', true)],
    ['Latin-1', latin1('{"name": "Prüfplatz Å"}')],
    ['escapes', '{"name": "Pr\\u00fcfplatz \\u00c5"}'],
  ])('with %s', (_, content) => {
    expect(readBench(textFile(content))).toEqual({ ok: true, value: { name: 'Prüfplatz Å' } });
  });

  test('from text as well as from a file', () => {
    expect(readBench('\ufeff{"instrument": {"fwhmNm": 1.8e-1}}')).toEqual({
      ok: true,
      value: { instrument: { fwhmNm: 0.18 } },
    });
  });
});

interface Case {
  readonly what: string;
  readonly text: string;
  readonly code: Problem['code'];
  readonly line: number | null;
  readonly says: string;
}

// What people read. Each sentence was read over when it was written; a changed one is to be read again.
const cases: readonly Case[] = [
  {
    what: 'an empty file',
    text: '',
    code: 'file.empty',
    line: null,
    says: 'expected JSON such as {"schema": "lampwright.bench/1"}, found an empty file. Choose the JSON file that describes the bench, or work without one.',
  },
  {
    what: 'blanks',
    text: '  \n',
    code: 'file.empty',
    line: null,
    says: 'expected JSON such as {"schema": "lampwright.bench/1"}, found nothing but blanks. Choose the JSON file that describes the bench, or work without one.',
  },
  {
    what: 'a table',
    text: 'wavelength,counts\n400,1\n',
    code: 'bench.not-json',
    line: 1,
    says: 'expected a value, found "wavelength". Write text in double quotes and numbers plainly, with a decimal point.',
  },
  {
    what: 'an unknown field',
    text: '{\n  "nam": "x"\n}',
    code: 'bench.unknown-field',
    line: 2,
    says: 'expected one of the fields schema, name, lamp, supply, axis, detector, instrument, dark, response, mirror, absorption, analysis, found the unknown field "nam". Did you mean "name"?',
  },
  {
    what: 'an unknown field inside another',
    text: '{\n  "lamp": {\n    "presurePa": 300\n  }\n}',
    code: 'bench.unknown-field',
    line: 3,
    says: 'expected one of the fields id, gas, pressurePa, pathLengthMm, gasTemperatureK, found the unknown field "lamp.presurePa". Did you mean "lamp.pressurePa"?',
  },
  {
    what: 'a known field in the wrong place',
    text: '{\n  "fwhmNm": 0.18\n}',
    code: 'bench.unknown-field',
    line: 2,
    says: 'expected one of the fields schema, name, lamp, supply, axis, detector, instrument, dark, response, mirror, absorption, analysis, found the unknown field "fwhmNm". Did you mean "instrument.fwhmNm"?',
  },
  {
    what: 'a field like no other',
    text: '{"zzzzzzzzzzzzzzz": 1}',
    code: 'bench.unknown-field',
    line: 1,
    says: 'expected one of the fields schema, name, lamp, supply, axis, detector, instrument, dark, response, mirror, absorption, analysis, found the unknown field "zzzzzzzzzzzzzzz". Remove it.',
  },
  {
    what: '"__proto__"',
    text: '{"__proto__": {"a": 1}}',
    code: 'bench.unknown-field',
    line: 1,
    says: 'expected one of the fields schema, name, lamp, supply, axis, detector, instrument, dark, response, mirror, absorption, analysis, found the unknown field "__proto__". Remove it.',
  },
  {
    what: '"constructor"',
    text: '{"lamp": {"constructor": 1}}',
    code: 'bench.unknown-field',
    line: 1,
    says: 'expected one of the fields id, gas, pressurePa, pathLengthMm, gasTemperatureK, found the unknown field "lamp.constructor". Remove it.',
  },
  {
    what: 'a capital letter',
    text: '{"detector":{"GainElectronsPerCount":5}}',
    code: 'bench.unknown-field',
    line: 1,
    says: 'expected one of the fields signal, offsetCounts, gainElectronsPerCount, readNoiseElectrons, saturationCounts, found the unknown field "detector.GainElectronsPerCount". Did you mean "detector.gainElectronsPerCount"?',
  },
  {
    what: 'a comma after the last field',
    text: '{\n  "name": "x",\n}',
    code: 'bench.not-json',
    line: 3,
    says: 'expected another field after the comma, found "}". Remove the comma after the last field.',
  },
  {
    what: 'a comma after the last entry',
    text: '{"analysis": {\n"upperLevels": [3, 4,]\n}}',
    code: 'bench.not-json',
    line: 2,
    says: 'expected another entry after the comma, found "]". Remove the comma after the last entry.',
  },
  {
    what: 'a field twice',
    text: '{\n"lamp": {"id": "a"},\n"name": "x",\n"lamp": {"id": "b"}\n}',
    code: 'bench.bad-value',
    line: 4,
    says: 'expected each field once, found "lamp" again after line 2. Keep one of the two.',
  },
  {
    what: 'an inner field twice',
    text: '{"lamp": {\n"id": "a",\n"id": "b"}}',
    code: 'bench.bad-value',
    line: 3,
    says: 'expected each field once, found "lamp.id" again after line 2. Keep one of the two.',
  },
  {
    what: 'a comment',
    text: '{\n  // the bench\n  "name": "x"\n}',
    code: 'bench.not-json',
    line: 2,
    says: 'expected a field name in double quotes, found a comment. Remove the comment: JSON has none.',
  },
  {
    what: 'single quotes',
    text: "{'name': 'x'}",
    code: 'bench.not-json',
    line: 1,
    says: 'expected a field name in double quotes, found "\'name\'". Write each field as "name": value.',
  },
  {
    what: 'no comma',
    text: '{\n"name": "x"\n"lamp": {}\n}',
    code: 'bench.not-json',
    line: 3,
    says: 'expected a comma or a closing brace after "name", found "lamp". Put a comma between two fields.',
  },
  {
    what: 'no colon',
    text: '{"name" "x"}',
    code: 'bench.not-json',
    line: 1,
    says: 'expected a colon after "name", found "x". Write each field as "name": value.',
  },
  {
    what: 'no closing brace',
    text: '{\n"name": "x"',
    code: 'bench.not-json',
    line: 2,
    says: 'expected a comma or a closing brace after "name", found the end of the file. Close every brace, bracket and quote that was opened.',
  },
  {
    what: 'no closing quote',
    text: '{\n"name": "x\n}',
    code: 'bench.not-json',
    line: 2,
    says: 'expected a closing double quote, found the end of the line. Close the text on the line where it starts.',
  },
  {
    what: 'something after the end',
    text: '{} {}',
    code: 'bench.not-json',
    line: 1,
    says: 'expected the end of the file, found "{". Remove what follows the last closing brace.',
  },
  {
    what: 'NaN',
    text: '{"instrument": {"fwhmNm": NaN}}',
    code: 'bench.not-json',
    line: 1,
    says: 'expected a value, found "NaN". Write text in double quotes and numbers plainly, with a decimal point.',
  },
  {
    what: 'a decimal comma',
    text: '{"instrument": {"fwhmNm": 0,18}}',
    code: 'bench.not-json',
    line: 1,
    says: 'expected a field name in double quotes, found "18". Write decimals with a point.',
  },
  {
    what: 'a leading zero',
    text: '{"lamp":{"pressurePa": 0300}}',
    code: 'bench.not-json',
    line: 1,
    says: 'expected a value, found "0300". Write text in double quotes and numbers plainly, with a decimal point.',
  },
  {
    what: 'a number too large',
    text: '{"lamp":{"pressurePa": 1e999}}',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected a number for "lamp.pressurePa", found a number too large for any use. Correct that value or leave the field out.',
  },
  {
    what: 'single backslashes',
    text: '{"dark": {"file": "C:\\data\\dark.csv"}}',
    code: 'bench.not-json',
    line: 1,
    says: 'expected text without unknown escapes, found "C:\\data\\dark.csv". Write a backslash in a path twice, or use forward slashes.',
  },
  {
    what: 'text for a number',
    text: '{\n"lamp": {\n"pressurePa": "300"\n}}',
    code: 'bench.bad-value',
    line: 3,
    says: 'expected a number for "lamp.pressurePa", found "300". Correct that value or leave the field out.',
  },
  {
    what: 'a negative pressure',
    text: '{"lamp": {"pressurePa": -3}}',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected a number above 0 for "lamp.pressurePa", found -3. Correct that value or leave the field out.',
  },
  {
    what: 'a width of zero',
    text: '{"instrument": {"fwhmNm": 0}}',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected a number above 0 for "instrument.fwhmNm", found 0. Correct that value or leave the field out.',
  },
  {
    what: 'an unknown unit',
    text: '{"axis": {"unit": "nanometre"}}',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected "nm" or "angstrom" or "um" or "cm-1" for "axis.unit", found "nanometre". Correct that value or leave the field out.',
  },
  {
    what: 'another schema',
    text: '{"schema": "lampwright.bench/2"}',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected "lampwright.bench/1" for "schema", found "lampwright.bench/2". Correct that value or leave the field out.',
  },
  {
    what: 'a list too short',
    text: '{"axis": {"coefficientsNm": [380]}}',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected at least 2 entries for "axis.coefficientsNm", found [380]. Correct that value or leave the field out.',
  },
  {
    what: 'a list too long',
    text: '{"axis": {"coefficientsNm": [1,2,3,4,5,6,7]}}',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected at most 6 entries for "axis.coefficientsNm", found [1,2,3,4,5,6,7]. Correct that value or leave the field out.',
  },
  {
    what: 'a level that is not whole',
    text: '{"analysis": {"upperLevels": [3,\n4,\n2.5]}}',
    code: 'bench.bad-value',
    line: 3,
    says: 'expected a whole number as entry 3 of "analysis.upperLevels", found 2.5. Correct that value or leave the field out.',
  },
  {
    what: 'a level too high',
    text: '{"analysis": {"upperLevels": [3,\n4,\n25]}}',
    code: 'bench.bad-value',
    line: 3,
    says: 'expected a number of at most 20 as entry 3 of "analysis.upperLevels", found 25. Correct that value or leave the field out.',
  },
  {
    what: 'a list for the whole',
    text: '[]',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected fields in braces, found []. Correct that value or leave the field out.',
  },
  {
    what: 'a number for the whole',
    text: '3',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected fields in braces, found 3. Correct that value or leave the field out.',
  },
  {
    what: 'null',
    text: '{"lamp": null}',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected fields in braces for "lamp", found null. Correct that value or leave the field out.',
  },
  {
    what: 'an empty path',
    text: '{"dark": {"file": ""}}',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected text that is not empty for "dark.file", found "". Correct that value or leave the field out.',
  },
  {
    what: 'a coverage in percent',
    text: '{"analysis": {"coverage": 95}}',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected a number of at most 0.999 for "analysis.coverage", found 95. Correct that value or leave the field out.',
  },
  {
    what: 'negative noise',
    text: '{"detector":{"readNoiseElectrons": -1}}',
    code: 'bench.bad-value',
    line: 1,
    says: 'expected a number of at least 0 for "detector.readNoiseElectrons", found -1. Correct that value or leave the field out.',
  },
  {
    what: 'the first of two faults',
    text: '{\n"supply": {"volts": 1},\n"lamp": {"pressurePa": "x"}\n}',
    code: 'bench.unknown-field',
    line: 2,
    says: 'expected one of the fields openCircuitVolts, currentMilliamps, capacitanceMicrofarads, bleedResistanceMegohms, found the unknown field "supply.volts". Remove it.',
  },
];

test.each(cases)('$what', ({ text, code, line, says }) => {
  const problem = refuse(text);
  expect({ code: problem.code, line: problem.lineNumber }).toEqual({ code, line });
  const where = line === null ? '' : `, line ${String(line)}`;
  expect(problemSentence(problem)).toBe(`Cannot use the bench file "bench.json"${where}: ${says}`);
});

test('a file of many brackets is refused, not followed to the bottom of the stack', () => {
  expect(refuse('['.repeat(200_000))).toMatchObject({
    code: 'bench.not-json',
    lineNumber: 1,
    expected: 'at most 64 brackets one inside another',
  });
});

test('a long value is shown in part', () => {
  expect(refuse(JSON.stringify({ name: 'x'.repeat(300) }))).toMatchObject({
    code: 'bench.bad-value',
    expected: 'at most 200 characters for "name"',
    found: `"${'x'.repeat(59)}…`,
  });
});

test('a file above 1 MiB is refused before it is looked at', () => {
  expect(refuse(' '.repeat(1_048_577))).toMatchObject({ code: 'file.too-large', found: '1025 KiB' });
});

test('the line is the right one after CR LF and after CR', () => {
  const text = '{\n"name": "x",\n"lamp": {"id": 3}\n}';
  for (const lineBreak of ['\n', '\r\n', '\r']) {
    expect(refuse(text.replaceAll('\n', lineBreak)).lineNumber).toBe(3);
  }
});

test('a long list costs one pass, not one a line', () => {
  const startedAt = performance.now();
  expect(refuse(`{"analysis": {"upperLevels": [${'3,\n'.repeat(200_000)}3]}}`).code).toBe('bench.bad-value');
  expect(performance.now() - startedAt).toBeLessThan(5000);
});

test('random damage is refused with a whole sentence or read, and never throws', () => {
  const random = createRandom(31);
  const pick = (count: number): number => Math.floor(random.uniform() * count);
  const good = JSON.stringify(benchTemplate, null, 2);
  let refused = 0;
  for (let i = 0; i < 500; i += 1) {
    const at = pick(good.length);
    const damaged = [
      good.slice(0, at),
      good.slice(0, at) + good.slice(at + 1 + pick(20)),
      good.slice(0, at) + String.fromCharCode(pick(128)) + good.slice(at),
    ][pick(3)]!;
    const result = readBench(textFile(damaged, 'bench.json'));
    if (result.ok) continue;
    refused += 1;
    expect(problemSentence(result.problem)).toMatch(
      /^Cannot use the bench file "bench\.json".*: expected .+, found .+\. .+[.?]$/s,
    );
  }
  expect(refused).toBeGreaterThan(300);
});
