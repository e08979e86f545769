import { expect, test } from 'vitest';
import { typeset } from '../../../shared-core/text/typeset.ts';

test.each([
  ['would hold 6.3e+18 electrons per m^3', 'would hold 6.3\u202f×\u202f10¹⁸ electrons per m³'],
  ['below 1e-7 of it', 'below 1\u202f×\u202f10⁻⁷ of it'],
  ['-1.14 nm (-3 pixels)', '−1.14 nm (−3 pixels)'],
  ['H-8 and T-07, 1e', 'H-8 and T-07, 1e'],
  ['2e20 m^-3', '2\u202f×\u202f10²⁰ m⁻³'],
])('%s', (plain, set) => {
  expect(typeset(plain)).toBe(set);
});
