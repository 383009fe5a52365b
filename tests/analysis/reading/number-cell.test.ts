import fc from 'fast-check';
import { expect, it } from 'vitest';
import { cellValue } from '../../../analysis/reading/number-cell.ts';

const printed = fc
  .tuple(fc.double({ min: -1e7, max: 1e7, noNaN: true }), fc.integer({ min: 0, max: 14 }))
  .map(([value, decimals]) => value.toFixed(decimals));

it('a printed number is the double nearest to its digits, with either decimal sign', () => {
  fc.assert(
    fc.property(printed, (text) => {
      // zero has no sign here
      const nearest = Number(text) + 0;
      expect(cellValue(text, 'point')).toBe(nearest);
      expect(cellValue(text.replace('.', ','), 'comma')).toBe(nearest);
    }),
    { numRuns: 5000 },
  );
});
