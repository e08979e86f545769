import { describe, expect, test } from 'vitest';
import {
  assumedResponseSigma,
  coversNm,
  responseAt,
  responseCovariance,
} from '../../../shared-core/populations/response-at.ts';

const table = {
  name: 'r.csv',
  sha256: '',
  wavelengthNm: Float64Array.from([400, 500, 700]),
  response: Float64Array.from([1, 3, 2]),
  relativeSigma: Float64Array.from([0.04, 0.02, 0.03]),
};

describe('the response table', () => {
  test('is interpolated straight, its uncertainty and slope with it', () => {
    const { response, relativeSigma, logSlopePerNm } = responseAt(table, [400, 450, 500, 600, 700]);
    expect([...response]).toEqual([1, 2, 3, 2.5, 2]);
    expect(relativeSigma[1]).toBeCloseTo(0.03, 12);
    expect(logSlopePerNm[1]).toBeCloseTo(0.02 / 2, 12);
    expect(logSlopePerNm[3]).toBeCloseTo(-0.005 / 2.5, 12);
  });

  test('covers its ends and nothing beyond', () => {
    expect([399.9, 400, 700, 700.1].map((nm) => coversNm(table, nm))).toEqual([false, true, true, false]);
  });

  test('without stated uncertainties takes the assumed one', () => {
    const { relativeSigma } = responseAt({ ...table, relativeSigma: null }, [450, 600]);
    expect([...relativeSigma]).toEqual([assumedResponseSigma, assumedResponseSigma]);
  });

  test('correlates errors over the stated length, makes them independent at zero and common at a very long one', () => {
    const sigma = Float64Array.from([0.02, 0.03]);
    expect(responseCovariance([480, 560], sigma, 80)[1]).toBeCloseTo(0.02 * 0.03 * Math.exp(-1), 15);
    expect(responseCovariance([480, 560], sigma, 0)[1]).toBe(0);
    expect(responseCovariance([480, 560], sigma, 1e9)[2]).toBeCloseTo(0.02 * 0.03, 9);
    expect(responseCovariance([480, 560], sigma, 80)[3]).toBeCloseTo(0.0009, 15);
  });
});
