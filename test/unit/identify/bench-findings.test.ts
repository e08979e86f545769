import { expect, test } from 'vitest';
import { benchFindings } from '../../../shared-core/identify/bench-findings.ts';
import type { ImpurityFinding } from '../../../shared-core/identify/describe-claim.ts';
import type { MeasuredEmitter } from '../../../shared-core/identify/judge-emitter.ts';

const claim = (emitter: string, confidence: 'sure' | 'likely' = 'sure'): ImpurityFinding => ({
  species: emitter.split(' ')[0]!,
  emitter,
  evidence: `${emitter} seen`,
  signalToNoise: 20,
  meaning: '',
  linesSeen: 3,
  linesExpected: 3,
  chanceProbability: 1e-8,
  confidence,
});
const measured = (name: string, status: 'absent' | 'out-of-range'): MeasuredEmitter => {
  const feature = {
    lines: [],
    fromNm: 0,
    toNm: 0,
    centreNm: 0,
    toleranceNm: 0,
    shape: 'line' as const,
    strength: 1,
    upperEnergyEv: null,
  };
  return {
    emitter: { species: name, name, features: [feature], meaning: '' },
    measurements: [
      {
        feature,
        status,
        area: 0,
        sigma: 1,
        signalToNoise: 0,
        recordedNm: 0,
        reachNm: 0,
        shading: null,
        isUnderHydrogen: false,
      },
    ],
  };
};
const find = (
  claimed: readonly ImpurityFinding[],
  others: readonly MeasuredEmitter[] = [],
  nearBalmerCount = 0,
) =>
  benchFindings({
    claimed,
    measured: others,
    unassigned: { count: nearBalmerCount, nearBalmerCount, strongest: [] },
  });

/** The rules are common practice of the trade. */
test('nitrogen with OH and NH: air, surely', () => {
  const [leak] = find([claim('N2'), claim('OH'), claim('NH')]);
  expect([leak!.id, leak!.confidence]).toEqual(['air-leak', 'sure']);
  expect(leak!.evidenceFor).toHaveLength(3);
});

test('nitrogen alone: likely air, and OH that was recorded and not seen speaks against it', () => {
  const [leak] = find([claim('N2')], [measured('OH', 'absent'), measured('O I', 'out-of-range')]);
  expect([leak!.id, leak!.confidence]).toEqual(['air-leak', 'likely']);
  expect(leak!.evidenceAgainst).toHaveLength(1);
  expect(leak!.wouldSettle.join(' ')).toContain('O I at 777.2');
});

test('OH without nitrogen: water, surely only where nitrogen was looked for', () => {
  expect(find([claim('OH')], [measured('N2', 'absent')])[0]).toMatchObject({
    id: 'water',
    confidence: 'sure',
  });
  expect(find([claim('OH')], [measured('N2', 'out-of-range')])[0]).toMatchObject({ confidence: 'likely' });
  expect(find([claim('OH'), claim('N2')]).map(({ id }) => id)).toEqual(['air-leak']);
});

test('carbon molecules: organics; two of them surely', () => {
  expect(find([claim('CH')])[0]).toMatchObject({ id: 'hydrocarbons', confidence: 'likely' });
  expect(find([claim('CH'), claim('C2')])[0]).toMatchObject({ id: 'hydrocarbons', confidence: 'sure' });
});

test('argon beside nitrogen is part of the air, argon alone is a gas of its own', () => {
  expect(find([claim('Ar I'), claim('N2')]).map(({ id }) => id)).toEqual(['air-leak']);
  expect(find([claim('Ar I')]).map(({ id }) => id)).toEqual(['other-gas']);
});

test('molecular hydrogen is no impurity, and many unnamed peaks beside it are its own', () => {
  const [molecule] = find([claim('H2')], [], 9);
  expect(molecule!.id).toBe('molecular-hydrogen');
  expect(molecule!.evidenceFor.join(' ')).toContain('9 of 9 unassigned peaks');
});

test('nothing found means nothing', () => {
  expect(find([], [measured('N2', 'absent')])).toEqual([]);
});
