import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { absorbanceVariance } from '../../analysis/spectrum/noise.ts';
import { withoutStrayLight, withStrayLight } from '../../analysis/spectrum/stray-light.ts';
import { published } from './values.ts';

const tableSchema = v.object({ rows: v.array(v.array(v.number())) });
const tables = v.parse(
  v.object({ ...tableSchema.entries, ceiling: tableSchema, noise: tableSchema }),
  published('stray-light-table.json'),
);

// Status: the definition (e.g. ASTM E387; Slavin, Anal. Chem. 35 (1963) 561; both named from
// memory), every row computed from it with mpmath at 40 digits.
describe('stray light, every row of the table', () => {
  it('is shown by the instrument as the definition says', () => {
    expect(tables.rows).toHaveLength(77);
    for (const [s = 0, absorbance = 0, shown = 0, relativeError = 0] of tables.rows) {
      // 10^-A and the logarithm cost some units in the last place of 1, over ln 10
      expect(Math.abs(withStrayLight(absorbance, s) - shown)).toBeLessThan(1e-15 * (2 + shown));
      const error = withStrayLight(absorbance, s) / absorbance - 1;
      expect(Math.abs(error - relativeError)).toBeLessThan(1e-12);
    }
  });

  it('is taken out again', () => {
    for (const [s = 0, absorbance = 0, shown = 0] of tables.rows) {
      // near the ceiling the shown absorbance hardly moves: rounding of it grows by its slope
      const slope = (10 ** -absorbance + s) / 10 ** -absorbance;
      const tolerance = 4 * Number.EPSILON * (1 + shown) * slope;
      expect(Math.abs(withoutStrayLight(shown, s) - absorbance)).toBeLessThan(tolerance);
    }
  });

  it('sets a ceiling, over which there is no absorbance behind a reading', () => {
    expect(tables.ceiling.rows).toHaveLength(7);
    for (const [s = 0, ceiling = 0] of tables.ceiling.rows) {
      expect(withStrayLight(40, s)).toBeCloseTo(ceiling, 14);
      expect(withoutStrayLight(ceiling + 1e-9, s)).toBeNaN();
      expect(withoutStrayLight(ceiling - 1e-9, s)).toBeGreaterThan(ceiling);
    }
  });
});

// Status: textbooks (Skoog; Ingle and Crouch) from memory, re-derived; computed with mpmath.
describe('noise of constant transmittance', () => {
  it('is least beside the absorbance at 0.434, and as large as the table says', () => {
    expect(tables.noise.rows).toHaveLength(10);
    // an error of the transmittance is one of 1/ln 10 of it in absorbance at A = 0
    const noise = { constant: 0, transmittance: 1 / Math.LN10 };
    const relative = (absorbance: number) =>
      Math.sqrt(absorbanceVariance(noise, absorbance)) / absorbance;
    for (const [absorbance = 0, constant = 0] of tables.noise.rows) {
      // a power, a root and a division in doubles
      expect(Math.abs(relative(absorbance) / constant - 1)).toBeLessThan(1e-13);
    }
    const best = 1 / Math.LN10;
    expect(relative(best)).toBeLessThan(relative(best - 1e-3));
    expect(relative(best)).toBeLessThan(relative(best + 1e-3));
  });
});
