import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { commonWeights } from '../../../analysis/unmixing/batch/common-weights.ts';
import { ownWeights } from '../../../analysis/unmixing/batch/own-weights.ts';
import { nonNegativeLeastSquares } from '../../../analysis/unmixing/non-negative.ts';
import { conditionOf } from '../../../analysis/unmixing/small-singular-values.ts';
import { weightedFit } from '../../../analysis/unmixing/weighted-fit.ts';
import { normal } from '../synthetic.ts';

const points = 101;
const nm = Float64Array.from({ length: points }, (_, i) => 240 + 2 * i);
const band = (centre: number, width: number, height: number) =>
  nm.map((at) => height * Math.exp(-0.5 * ((at - centre) / width) ** 2));
const species = [band(275, 16, 9000), band(320, 20, 16000), band(355, 22, 27000)];
const baseline = [new Float64Array(points).fill(1), nm.map((at) => (at - 340) / 200)];
const noise = { constant: 3e-4, transmittance: 2e-4 };
const free = [false, false, false, true, true];

/** Spectra one after the other; amounts may be nothing, so that noise takes them below it. */
function spectra(count: number, columns: readonly Float64Array[], seed: number): Float64Array {
  const gauss = normal(seed);
  return Float64Array.from({ length: count }, (_, s) => s).reduce(
    (all, s) => {
      const amounts = columns.map((_, k) => (k < 3 ? ((s + k) % 3) * 1e-5 : 1e-3 * gauss()));
      for (let i = 0; i < points; i++) {
        const absorbance = columns.reduce((sum, column, k) => sum + amounts[k]! * column[i]!, 0);
        all[s * points + i] = absorbance + 4e-4 * gauss();
      }
      return all;
    },
    new Float64Array(count * points),
  );
}

const one = (batch: Float64Array, s: number) => batch.slice(s * points, (s + 1) * points);

/**
 * The largest departure, in shares of the whole fit: columns at norm 1, so that an amount of nothing
 * is held to what its neighbours are known to.
 */
function departure(
  columns: readonly Float64Array[],
  got: ArrayLike<number>,
  wanted: ArrayLike<number>,
): number {
  const sizes = columns.map((column) => Math.hypot(...column));
  const whole = Math.hypot(...sizes.map((size, k) => size * wanted[k]!));
  return Math.max(...sizes.map((size, k) => (size * Math.abs(got[k]! - wanted[k]!)) / whole));
}

describe('a batch with common weights', () => {
  it.each([
    ['three species, offset and line', [...species, ...baseline], free],
    ['the baseline first', [...baseline, ...species], [true, true, false, false, false]],
    ['species alone', species, []],
    ['nothing constrained', [...species, ...baseline], [true, true, true, true, true]],
    [
      'four species, which go the general way',
      [...species, band(300, 12, 5000), ...baseline],
      [false, false, false, false, true, true],
    ],
  ])('agrees with Lawson and Hanson for %s', (_, columns, isFree) => {
    // odd, so that the last spectrum has no partner
    const batch = spectra(31, columns, 5);
    const found = commonWeights(columns, batch, isFree);
    for (let s = 0; s < 31; s++) {
      const { x } = nonNegativeLeastSquares(columns, one(batch, s), isFree);
      // condition about 10: a few units in the last place
      expect(departure(columns, found.slice(s * x.length, (s + 1) * x.length), x)).toBeLessThan(
        1e-12,
      );
    }
  });

  it('agrees with Lawson and Hanson on anything', () => {
    const entry = fc.double({ min: -1, max: 1, noNaN: true });
    const vector = fc.array(entry, { minLength: 6, maxLength: 6 }).map((v) => Float64Array.from(v));
    fc.assert(
      fc.property(fc.array(vector, { minLength: 1, maxLength: 3 }), vector, (columns, right) => {
        const usable = columns.every((column) => Math.hypot(...column) > 1e-3);
        fc.pre(usable);
        const { x, residualNorm } = nonNegativeLeastSquares(columns, right);
        const found = commonWeights(columns, right, []);
        const rest = right.map(
          (value, i) => value - columns.reduce((sum, column, k) => sum + found[k]! * column[i]!, 0),
        );
        expect([...found].every((amount) => amount >= 0)).toBe(true);
        // columns may all but depend on each other: then the answers differ and the residual does not
        expect(Math.hypot(...rest)).toBeLessThanOrEqual(residualNorm + 1e-9);
        expect(found).toHaveLength(x.length);
      }),
      { numRuns: 300 },
    );
  });

  it('sends columns that depend on each other the general way', () => {
    const twins = [species[0]!, species[0]!.map((value) => 2 * value)];
    const found = commonWeights(twins, species[0]!, []);
    expect(found[0]! + 2 * found[1]!).toBeCloseTo(1, 12);
  });

  it('refuses spectra of another length', () => {
    expect(() => commonWeights(species, new Float64Array(points + 1), [])).toThrow(RangeError);
  });
});

describe('a batch with weights of its own', () => {
  it.each([
    ['offset and line', [...species, ...baseline]],
    ['no baseline', species],
    ['six columns, more than one tile', [...species, band(300, 12, 5000), ...baseline]],
  ])('agrees with the weighted fit for %s', (_, columns) => {
    const batch = spectra(12, columns, 9);
    // the weights stand after a few rounds, as they do in the weighted fit
    const found = ownWeights(columns, batch, noise, 8);
    if (!found) throw new Error('these columns do not depend on each other');
    const size = columns.length;
    for (let s = 0; s < 12; s++) {
      const fit = weightedFit(columns, one(batch, s), noise, () => new Float64Array(points));
      const amounts = found.parameters.slice(s * size, (s + 1) * size);
      expect(departure(columns, amounts, fit.parameters)).toBeLessThan(1e-12);
      expect(found.chiSquare[s]! / fit.df / fit.reducedChiSquare).toBeCloseTo(1, 10);
      for (let k = 0; k < size; k++) {
        const variance = fit.gain[k]!.reduce(
          (sum, value, i) => sum + value * value * fit.variance[i]!,
          0,
        );
        // twice the digits of the condition are lost in a covariance from normal equations
        expect(found.covariance[(s * size + k) * size + k]! / variance).toBeCloseTo(1, 9);
        const [low, high] = [0, 1].map((end) => found.interval95[2 * (s * size + k) + end]!);
        expect((high! - low!) / (2 * 1.959963984540054 * Math.sqrt(variance))).toBeCloseTo(1, 9);
      }
    }
  });

  it('gives no answer where the columns depend on each other', () => {
    const twins = [species[0]!, species[0]!.map((value) => 2 * value)];
    expect(ownWeights(twins, species[0]!, noise)).toBeNull();
  });
});

describe('the condition of a small matrix', () => {
  it('is 1 for orthogonal columns of any length, and known for a pair at an angle', () => {
    expect(conditionOf([Float64Array.of(3, 0), Float64Array.of(0, 1e-9)])).toBe(1);
    // singular values of two unit columns at angle φ: √(1 ± cos φ)
    for (const angle of [1, 0.1, 1e-3, 1e-6]) {
      const found = conditionOf([
        Float64Array.of(1, Math.cos(angle)),
        Float64Array.of(0, Math.sin(angle)),
      ]);
      expect(found / (1 / Math.tan(angle / 2))).toBeCloseTo(1, 6);
    }
  });

  it('is infinite for a column of zeros', () => {
    expect(conditionOf([Float64Array.of(1, 0), Float64Array.of(0, 0)])).toBe(
      Number.POSITIVE_INFINITY,
    );
  });
});
