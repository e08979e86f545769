import { expect, test } from 'vitest';
import { traps } from '../accuracy/traps.ts';

const drawCount = 200;
/** Of 200 draws, by the words of the trap; `npm run accuracy traps` prints the rates. */
const most: Readonly<Record<string, number>> = {
  never: 0,
  'at most 1 %': 2,
  // The stated level is a property of the test, which binomial chance may exceed: 6 of 200 has a chance of one in 200.
  'about 1 %': 6,
  'at most 5 %': 10,
};

test.each(traps)('$name: $allowed', ({ allowed, isCaught }) => {
  let caught = 0;
  for (let index = 0; index < drawCount; index++) if (isCaught(index)) caught++;
  expect(caught).toBeLessThanOrEqual(most[allowed]!);
});
