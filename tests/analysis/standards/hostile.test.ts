import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { linearityOf } from '../../../analysis/standards/linearity.ts';
import { molarAbsorptivityAt } from '../../../analysis/standards/molar-absorptivity.ts';
import type { Solution } from '../../../analysis/standards/solution.ts';
import { combineSolutions } from '../../../analysis/standards/species-standard.ts';

/** Anything that can have been read: flat, negative, spiky, with holes, of few points, given as ε. */
const solution: fc.Arbitrary<Solution> = fc
  .record({
    start: fc.integer({ min: 200, max: 260 }),
    values: fc.array(
      fc.oneof(
        fc.double({ min: -0.2, max: 2, noNaN: true }),
        fc.constantFrom(0, 1, Number.NaN, 1e-12),
      ),
      { minLength: 1, maxLength: 60 },
    ),
    concentration: fc.constantFrom(1e-9, 1e-5, 2e-5, 1),
    isEpsilon: fc.boolean(),
    u: fc.constantFrom(0, 1e-3, 0.5),
  })
  .map(({ start, values, concentration, isEpsilon, u }) => {
    const usable = Uint8Array.from(values, (value) => (Number.isNaN(value) ? 0 : 1));
    const largest = Math.max(0, ...values.filter((value) => !Number.isNaN(value)));
    return {
      standard: `S${start}`,
      species: 'mono',
      wavelengthNm: Float64Array.from(values, (_, i) => start + i),
      epsilon: Float64Array.from(values, (value) => value / concentration),
      sd: new Float64Array(values.length).fill(3e-4 / concentration),
      usable,
      largestAbsorbance: isEpsilon ? null : largest,
      absorbancePerEpsilon: isEpsilon ? null : concentration,
      scaleErrors: [{ source: `dilution of S${start}`, relative: u }],
    };
  });

/** Several of them, each with a name of its own as the sheet asks. */
const solutions = fc.array(solution, { minLength: 1, maxLength: 5 }).map((some) =>
  some.map((each, index) => ({
    ...each,
    standard: `S${index + 1}`,
    scaleErrors: each.scaleErrors.map((error) => ({
      ...error,
      source: `dilution of S${index + 1}`,
    })),
  })),
);

describe('solutions of any kind', () => {
  it('are combined into numbers, never into none', () => {
    fc.assert(
      fc.property(solutions, (some) => {
        const standard = combineSolutions(some);
        for (const number of [
          ...standard.factors,
          ...standard.offsets,
          standard.constantUncertainty,
          standard.relativeScaleUncertainty,
        ]) {
          expect(Number.isFinite(number)).toBe(true);
        }
        for (const factor of standard.factors) expect(factor).toBeGreaterThan(0);
        const { curvature, straightUpTo } = linearityOf(standard.solutions);
        expect(Number.isNaN(curvature?.f ?? 0)).toBe(false);
        expect(straightUpTo ?? 0).toBeGreaterThanOrEqual(0);
        const nm = Float64Array.from({ length: 130 }, (_, i) => 195 + i);
        const { epsilon, sd } = molarAbsorptivityAt(standard, nm);
        for (const [i, value] of epsilon.entries()) {
          if (!Number.isNaN(value)) expect(Number.isFinite(sd[i]!)).toBe(true);
        }
      }),
      { numRuns: 500 },
    );
  });
});
