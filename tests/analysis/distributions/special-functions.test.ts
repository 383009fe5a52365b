import { describe, expect, it } from 'vitest';
import { deviance } from '../../../analysis/distributions/deviance.ts';
import { incompleteBeta } from '../../../analysis/distributions/incomplete-beta.ts';
import { incompleteGamma } from '../../../analysis/distributions/incomplete-gamma.ts';
import { logGamma } from '../../../analysis/distributions/log-gamma.ts';
import { positiveRoot } from '../../../analysis/distributions/positive-root.ts';
import { stirlingError } from '../../../analysis/distributions/stirling-error.ts';

function relative(value: number, right: number): number {
  return Math.abs(value / right - 1);
}

describe('log gamma', () => {
  it('gives the factorials', () => {
    let factorial = 1;
    for (let n = 1; n <= 170; n++) {
      // the sum of fifteen coefficients, relative to the larger of the logarithm and 1
      const right = Math.log(factorial);
      expect(Math.abs(logGamma(n) - right)).toBeLessThanOrEqual(5e-15 * Math.max(right, 1));
      factorial *= n;
    }
  });

  it('goes as -ln x towards 0', () => {
    for (const x of [1e-10, 1e-100, 1e-300]) {
      // ln Γ(x) = -ln x - γ x + …, γ = 0.5772…
      expect(relative(logGamma(x), -Math.log(x) - 0.5772156649015329 * x)).toBeLessThan(1e-15);
    }
  });
});

it('the error of Stirling’s formula runs smoothly from the function itself into its series', () => {
  expect(relative(stirlingError(10 - 1e-9), stirlingError(10))).toBeLessThan(1e-9 + 5e-13);
  // 1/(12 a) less 1/(360 a³)
  expect(relative(stirlingError(1e4), 1 / 12e4 - 1 / 360e12)).toBeLessThan(1e-15);
});

it('the deviance keeps its digits next to 1 and joins the plain formula', () => {
  for (const gap of [1e-12, -1e-7, 1e-4]) {
    const right = gap ** 2 / 2 - gap ** 3 / 3 + gap ** 4 / 4 - gap ** 5 / 5;
    // the next term of the series is gap⁶/6
    expect(relative(deviance(1 + gap, gap), right)).toBeLessThan(1e-14);
  }
  for (const u of [0.5001, 1.4999]) {
    expect(relative(deviance(u, u - 1), u - 1 - Math.log(u))).toBeLessThan(1e-14);
  }
  expect(deviance(1, 0)).toBe(0);
});

describe('incomplete functions of a million and more', () => {
  // Status: computed with mpmath 1.3, 40 digits (numerical integration of the density).
  it('gamma', () => {
    expect(relative(incompleteGamma(5e5, 5e5).upper, 0.4998119368033945)).toBeLessThan(1e-12);
  });

  it('beta', () => {
    expect(relative(incompleteBeta(1e6, 2e6, 0.333), 0.11032283951664962)).toBeLessThan(1e-11);
  });
});

it('the root search ends at 0 or at infinity where no double is the root', () => {
  expect(positiveRoot(() => false)).toBe(0);
  expect(positiveRoot(() => true)).toBe(Number.POSITIVE_INFINITY);
  for (const root of [1e-250, 0.3, 7e200]) {
    // a neighbour of the root at most
    expect(
      relative(
        positiveRoot((x) => x < root),
        root,
      ),
    ).toBeLessThan(3e-16);
  }
});
