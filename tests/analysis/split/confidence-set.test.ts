import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { normalCdf } from '../../../analysis/distributions/normal.ts';
import { acceptance, isAccepted } from '../../../analysis/split/bounded-mean.ts';
import {
  type BoundedParameter,
  confidence,
  confidenceInterval,
} from '../../../analysis/split/confidence-set.ts';
import { fiellerSet, type UncertainRatio } from '../../../analysis/split/fieller.ts';

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });

/** Positive definite by making: variances and a correlation short of 1. */
const ratios = fc
  .tuple(number(-3, 3), number(-3, 3), number(0.01, 1), number(0.01, 1), number(-0.95, 0.95))
  .map(
    ([numerator, denominator, sdA, sdB, correlation]): UncertainRatio => ({
      numerator,
      denominator,
      numeratorVariance: sdA ** 2,
      denominatorVariance: sdB ** 2,
      covariance: correlation * sdA * sdB,
    }),
  );

/** Departure of the data from a supposed ratio, in standard deviations. */
function departure(ratio: UncertainRatio, value: number): number {
  const { numerator, denominator, numeratorVariance, denominatorVariance, covariance } = ratio;
  const variance = numeratorVariance - 2 * value * covariance + value * value * denominatorVariance;
  return (numerator - value * denominator) / Math.sqrt(variance);
}

describe('the closed form of a confidence set of a ratio', () => {
  it('holds just the ratios that the data do not contradict', () => {
    fc.assert(
      fc.property(ratios, number(0.5, 4), number(-20, 20), (ratio, quantile, value) => {
        const set = fiellerSet(ratio, quantile);
        const z = Math.abs(departure(ratio, value));
        // on an end itself rounding decides
        fc.pre(Math.abs(z - quantile) > 1e-9);
        const between = set.shape !== 'everything' && value >= set.lower && value <= set.upper;
        const held = set.shape === 'everything' || (set.shape === 'bounded') === between;
        expect(held).toBe(z < quantile);
      }),
      { numRuns: 2000 },
    );
  });

  it('turns over when the ratio is turned over', () => {
    fc.assert(
      fc.property(ratios, (ratio) => {
        const set = fiellerSet(ratio, 1.96);
        const turned = fiellerSet(
          {
            numerator: ratio.denominator,
            denominator: ratio.numerator,
            numeratorVariance: ratio.denominatorVariance,
            denominatorVariance: ratio.numeratorVariance,
            covariance: ratio.covariance,
          },
          1.96,
        );
        expect(turned.shape === 'everything').toBe(set.shape === 'everything');
        // 0 within the one is infinity within the other: then it is no plain turning of the ends
        if (set.shape !== 'bounded' || turned.shape !== 'bounded') return;
        // an end of about 0 turns into one that is huge, with what rounding left of it
        fc.pre(Math.abs(set.lower) > 1e-6 && Math.abs(turned.lower) > 1e-6);
        expect(Math.abs(turned.lower * set.upper - 1)).toBeLessThan(1e-8);
        expect(Math.abs(turned.upper * set.lower - 1)).toBeLessThan(1e-8);
      }),
    );
  });

  it('is a half line where the denominator is just one quantile from nothing', () => {
    const at = { numeratorVariance: 0.01, denominatorVariance: 1, covariance: 0 };
    // (3 - 2ρ)² ≤ 4 (0.01 + ρ²): 9 - 12ρ ≤ 0.04
    const right = fiellerSet({ numerator: 3, denominator: 2, ...at }, 2);
    expect(right).toEqual({ shape: 'bounded', lower: 8.96 / 12, upper: Number.POSITIVE_INFINITY });
    const left = fiellerSet({ numerator: -3, denominator: 2, ...at }, 2);
    expect(left).toEqual({ shape: 'bounded', lower: Number.NEGATIVE_INFINITY, upper: -8.96 / 12 });
    const nowhere = fiellerSet({ numerator: 0, denominator: 2, ...at }, 2);
    expect(nowhere).toEqual({ shape: 'everything' });
  });
});

describe('the interval of a bounded parameter', () => {
  const parameters = fc.tuple(ratios, number(3, 200)).map(([ratio, df]): BoundedParameter => {
    const denominator = 1 + Math.abs(ratio.denominator);
    const whole = { ...ratio, denominator };
    return {
      departure: (value) => departure(whole, value),
      sd: (value) => Math.abs((whole.numerator / denominator - value) / departure(whole, value)),
      estimate: whole.numerator / denominator,
      upper: 1,
      df,
      ratio: whole,
    };
  });

  it('is never empty, never outside of the bounds, and holds the allowed value nearest the estimate', () => {
    fc.assert(
      fc.property(parameters, (parameter) => {
        const [low, high] = confidenceInterval(parameter);
        const nearest = Math.min(Math.max(parameter.estimate, 0), 1);
        expect(low).toBeGreaterThanOrEqual(0);
        expect(high).toBeLessThanOrEqual(1);
        expect(low).toBeLessThanOrEqual(nearest);
        expect(high).toBeGreaterThanOrEqual(nearest);
      }),
    );
  });

  it('is the same by the closed form and by trying values', () => {
    let tries = 0;
    let closed = 0;
    const share = (estimate: number, sdA: number, sdB: number): BoundedParameter => {
      const sd = (value: number) => Math.hypot(sdA, value * sdB);
      return {
        departure: (value) => {
          tries += 1;
          return (estimate - value) / sd(value);
        },
        sd,
        estimate,
        upper: 1,
        df: 12,
      };
    };
    fc.assert(
      fc.property(number(0.02, 0.98), number(0.002, 0.2), number(0.002, 0.2), (at, sdA, sdB) => {
        const tried = confidenceInterval(share(at, sdA, sdB));
        tries = 0;
        const given = confidenceInterval({
          ...share(at, sdA, sdB),
          ratio: {
            numerator: at,
            denominator: 1,
            numeratorVariance: sdA ** 2,
            denominatorVariance: sdB ** 2,
            covariance: 0,
          },
        });
        if (tries === 0) closed += 1;
        // forty-two halvings of a step leave 1e-13 of it
        for (const [k, end] of given.entries()) {
          expect(Math.abs(end - (tried[k] ?? Number.NaN))).toBeLessThan(1e-12);
        }
      }),
    );
    // or the comparison would have been of one way with itself
    expect(closed).toBeGreaterThan(10);
  });

  it('tells whether a reading is taken in without looking for the ends', () => {
    fc.assert(
      fc.property(number(1e-6, 4), number(1e-6, 4), number(-6, 6), (mean, room, z) => {
        const [low, high] = acceptance(mean, mean + room, confidence);
        // within the halvings' rounding of an end either answer is right
        fc.pre(Math.abs(z - low) > 1e-9 && Math.abs(z - high) > 1e-9);
        expect(isAccepted(z, mean, mean + room, confidence)).toBe(z > low && z < high);
      }),
      { numRuns: 2000 },
    );
  });

  it('takes in 95 % of the readings at every mean, by the bound as well', () => {
    fc.assert(
      fc.property(number(0, 8), number(0.1, 8), (mean, room) => {
        const [low, high] = acceptance(mean, mean + room, confidence);
        // eighty halvings; the chance is summed by two tails of the normal
        expect(normalCdf(high) - normalCdf(low)).toBeCloseTo(0.95, 10);
      }),
    );
  });
});
