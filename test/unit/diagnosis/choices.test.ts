import { describe, expect, test } from 'vitest';
import { branchingCheck } from '../../../shared-core/diagnosis/checks/branching-check.ts';
import type { Evidence } from '../../../shared-core/diagnosis/evidence.ts';
import { notDetermined } from '../../../shared-core/optical-depth/describe-depth.ts';
import { selfAbsorptionSection } from '../../../shared-core/diagnosis/self-absorption.ts';
import { hydrogenLine, transitionProbabilityPerS } from '../../../shared-core/physics/hydrogen.ts';
import { madeUpFits } from '../../support/made-up-fits.ts';
import { checkOf, runDiagnosis } from '../../support/run-evidence.ts';

describe('widening by the Birge ratio', () => {
  /** H-gamma fifteen per cent too bright for the flat table: scatter far beyond what is stated. */
  const simulation = { responseAt: (nm: number) => (nm < 450 && nm > 420 ? 1.15 : 1) };
  const plain = runDiagnosis({ simulation }).diagnosis;
  const widened = runDiagnosis({ simulation, options: { widening: 'birge' } }).diagnosis;

  test('is done only where it is asked for', () => {
    expect(plain.temperature.widening).toBe(1);
    expect(plain.temperature.birgeRatio!).toBeGreaterThan(2);
    expect(widened.temperature.widening).toBe(plain.temperature.birgeRatio);
    expect(widened.temperature.kelvin).toBe(plain.temperature.kelvin);
  });

  test('is the root of chi-square over its degrees of freedom, and multiplies the standard uncertainty', () => {
    const { chiSquare, degreesOfFreedom, widening, sigmaKelvin } = widened.temperature;
    expect(widening).toBeCloseTo(Math.sqrt(chiSquare! / degreesOfFreedom!), 12);
    expect(sigmaKelvin! / plain.temperature.sigmaKelvin!).toBeCloseTo(widening, 9);
    // The interval is that of 1/T: its half-width in 1/T grows by the same factor.
    const half = ({ lowKelvin, highKelvin }: { lowKelvin: number | null; highKelvin: number | null }) =>
      1 / lowKelvin! - 1 / highKelvin!;
    expect(half(widened.temperature) / half(plain.temperature)).toBeCloseTo(widening, 9);
  });

  test('is said in the text and a note, and the check still tells of the scatter', () => {
    expect(widened.temperature.text).toContain('Birge ratio');
    expect(widened.notes.join(' ')).toContain('widened by the Birge ratio');
    expect(checkOf(widened, 'population-straightness')!.verdict).not.toBe('sound');
    expect(plain.notes.join(' ')).not.toContain('Birge');
  });

  test('never narrows', () => {
    for (const seed of [2, 3, 4, 5, 6]) {
      const found = runDiagnosis({ simulation: { seed }, options: { widening: 'birge' } }).diagnosis;
      expect(found.temperature.widening).toBe(Math.max(1, found.temperature.birgeRatio!));
    }
  });
});

describe('correction for self-absorption', () => {
  const simulation = { hAlphaOpticalDepth: 3, seed: 9 };
  const reported = runDiagnosis({ simulation });
  const applied = runDiagnosis({ simulation, options: { selfAbsorption: 'correct' } });

  test('is offered, and changes nothing unasked', () => {
    const { selfAbsorption, temperature } = reported.diagnosis;
    expect(selfAbsorption.isApplied).toBe(false);
    expect(selfAbsorption.corrected!.kelvin).not.toBe(temperature.kelvin);
    // Self-absorption flattens the plot: the temperature uncorrected is too high.
    expect(temperature.lowKelvin!).toBeGreaterThan(6300);
    expect(selfAbsorption.corrected!.lowKelvin).toBeLessThan(6300);
    expect(selfAbsorption.corrected!.highKelvin).toBeGreaterThan(6300);
  });

  test('replaces the temperature when asked, and text, note and check say so', () => {
    const { selfAbsorption, temperature, notes, checks } = applied.diagnosis;
    expect(selfAbsorption.isApplied).toBe(true);
    expect(temperature.kelvin).toBe(reported.diagnosis.selfAbsorption.corrected!.kelvin);
    expect(temperature.text).toContain('Corrected for self-absorption');
    expect(notes.join(' ')).toContain('corrected for self-absorption, as chosen');
    // One parameter more is one degree of freedom less.
    expect(temperature.degreesOfFreedom).toBe(reported.diagnosis.temperature.degreesOfFreedom! - 1);
    expect(checks.find(({ id }) => id === 'self-absorption')!.facts['isApplied']).toBe(true);
    // What rests on a model of the tube is never better than this.
    expect(applied.diagnosis.verdict).toBe('use with care');
  });

  test('puts the points of the plot back on the line', () => {
    const worst = ({ evidence }: typeof applied): number =>
      Math.max(...evidence.temperature.boltzmann!.line.residuals.map(Math.abs));
    expect(worst(applied)).toBeLessThan(worst(reported) / 5);
    expect(applied.diagnosis.temperature.chiSquare!).toBeLessThan(10);
    expect(reported.diagnosis.temperature.chiSquare!).toBeGreaterThan(100);
  });

  test('is not made where none is seen, and a note says that it was asked for', () => {
    const { diagnosis } = runDiagnosis({ options: { selfAbsorption: 'correct' } });
    expect(diagnosis.selfAbsorption).toMatchObject({
      status: 'none-seen',
      opticalDepth: null,
      isApplied: false,
      corrected: null,
    });
    expect(diagnosis.selfAbsorption.high!).toBeGreaterThan(0);
    expect(diagnosis.notes.join(' ')).toContain('No correction for self-absorption');
  });

  test('a depth measured apart from the emission is set beside it', () => {
    const depth = reported.evidence.selfAbsorption.opticalDepth!;
    const text = (opticalDepth: number): string =>
      selfAbsorptionSection({
        ...reported.evidence,
        opticalDepths: [
          {
            ...notDetermined('H-alpha', 'mirror', ''),
            status: 'measured',
            opticalDepth: { value: opticalDepth, low: opticalDepth - 0.2, high: opticalDepth + 0.2 },
          },
        ],
      }).text;
    expect(text(depth)).toContain('which agrees');
    expect(text(20)).toContain('does not agree');
  });
});

describe('self-absorption cannot be tested', () => {
  test('without a response table, since the spectrometer could hide it', () => {
    const { diagnosis } = runDiagnosis({ response: null });
    expect(diagnosis.selfAbsorption.status).toBe('not-testable');
    expect(diagnosis.selfAbsorption.text).toContain('response');
    expect(checkOf(diagnosis, 'self-absorption')!.verdict).toBe('use with care');
  });

  test('but a deficit is still told', () => {
    const { diagnosis } = runDiagnosis({ response: null, simulation: { hAlphaOpticalDepth: 3 } });
    expect(diagnosis.selfAbsorption.status).toBe('suspected');
  });

  test('with too few lines beside H-alpha, or without it', () => {
    const leftOut = ['H-gamma', 'H-delta', 'H-epsilon'];
    expect(runDiagnosis({ options: { leftOut } }).diagnosis.selfAbsorption.text).toContain(
      'two usable lines',
    );
    const clipped = runDiagnosis({ simulation: { brightestPixelElectrons: 600_000 } }).diagnosis;
    expect(clipped.selfAbsorption.status).toBe('not-testable');
    expect(checkOf(clipped, 'self-absorption')!.verdict).toBe('sound');
  });

  test('H-alpha left out by hand is still compared with the others', () => {
    const { diagnosis } = runDiagnosis({
      simulation: { hAlphaOpticalDepth: 3 },
      options: { leftOut: ['H-alpha'] },
    });
    expect(diagnosis.lines[0]!.used).toBe(false);
    expect(diagnosis.selfAbsorption.status).toBe('suspected');
  });
});

describe('lines that share an upper level', () => {
  const paschen = {
    ...hydrogenLine(7),
    id: 'Paschen-7',
    lowerLevel: 3,
    wavelengthVacuumNm: 1005.22,
    wavelengthAirNm: 1004.94,
    transitionProbabilityPerS: transitionProbabilityPerS(7, 3),
  };
  const lines = [...[3, 4, 5, 6, 7].map((level) => hydrogenLine(level)), paschen];
  const { evidence } = runDiagnosis();
  const withPaschen = (factor: number): Evidence => ({
    ...evidence,
    response: null,
    fittedLines: lines,
    fits: madeUpFits(
      lines.map((line) => ({
        line,
        area: line.upperWeight * line.transitionProbabilityPerS * (line.id === 'Paschen-7' ? factor : 1),
        relativeSigma: 0.01,
      })),
    ),
  });

  test('agree or ask for care', () => {
    expect(branchingCheck(withPaschen(1.01))!.verdict).toBe('sound');
    const off = branchingCheck(withPaschen(1.2))!;
    expect(off.verdict).toBe('use with care');
    expect(off.facts).toMatchObject({ pairCount: 1, lineIds: 'Paschen-7 H-epsilon', upperLevel: 7 });
    expect(Number(off.facts['ratio'])).toBeCloseTo(1.2, 9);
    expect(off.remedy).toContain('does not depend on the gas');
  });

  test('no such pair, no check', () => {
    expect(branchingCheck(evidence)).toBeNull();
  });
});
