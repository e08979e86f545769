import { describe, expect, test } from 'vitest';
import { combineUncertainties } from '../../shared-core/uncertainty/gum.ts';
import { expectClose } from '../support/expect-close.ts';

describe('JCGM 100:2008 (GUM), worked examples', () => {
  test('H.1, end gauge: u_c = 32 nm, 16 effective degrees of freedom, U_99 = 93 nm', () => {
    const result = combineUncertainties(
      [
        { name: 'standard', standardUncertainty: 25, sensitivity: 1, degreesOfFreedom: 18 },
        { name: 'difference', standardUncertainty: 9.7, sensitivity: 1, degreesOfFreedom: 25.6 },
        { name: 'expansion', standardUncertainty: 2.9, sensitivity: 1, degreesOfFreedom: 50 },
        { name: 'temperature', standardUncertainty: 16.6, sensitivity: 1, degreesOfFreedom: 2 },
      ],
      0.99,
    );
    // Published 32 nm and 93 nm from rounded parts; unrounded 31.67 and 92.5.
    expectClose(result.standardUncertainty, { expected: 31.67, abs: 0.05, because: 'H.1.4' });
    expectClose(result.effectiveDegreesOfFreedom, { expected: 16.76, abs: 0.05, because: 'H.1.6' });
    expectClose(result.coverageFactor, { expected: 2.92, abs: 0.005, because: 't_99(16), table G.2' });
    expectClose(result.expandedUncertainty, { expected: 92.5, abs: 0.3, because: 'H.1.6' });
    expectClose(
      result.shares.reduce((sum, share) => sum + share, 0),
      { expected: 1, rel: 1e-12, because: 'shares' },
    );
  });

  test('H.2, resistance from voltage, current and phase with their correlations: 127.732(71) ohm', () => {
    // Table H.2 and H.3: V 4.9990(32) V, I 19.6610(95) mA, phi 1.04446(75) rad; r -0.36, 0.86, -0.65. From memory.
    const [V, I, phi] = [4.999, 19.661e-3, 1.04446];
    const R = (V / I) * Math.cos(phi);
    const result = combineUncertainties(
      [
        { name: 'V', standardUncertainty: 0.0032, sensitivity: R / V, degreesOfFreedom: Infinity },
        { name: 'I', standardUncertainty: 0.0095e-3, sensitivity: -R / I, degreesOfFreedom: Infinity },
        {
          name: 'phi',
          standardUncertainty: 0.00075,
          sensitivity: (-V / I) * Math.sin(phi),
          degreesOfFreedom: Infinity,
        },
      ],
      0.95,
      [
        { i: 0, j: 1, r: -0.355 },
        { i: 0, j: 2, r: 0.858 },
        { i: 1, j: 2, r: -0.645 },
      ],
    );
    expectClose(R, { expected: 127.732, abs: 0.005, because: 'H.2, table H.4' });
    expectClose(result.standardUncertainty, { expected: 0.071, abs: 0.002, because: 'H.2, table H.4' });
    expect(result.effectiveDegreesOfFreedom).toBe(Infinity);
    expectClose(result.coverageFactor, { expected: 1.959964, abs: 1e-5, because: 'normal' });
  });
});
