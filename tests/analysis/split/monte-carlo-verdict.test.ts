import { describe, expect, it } from 'vitest';
import type { DrawnDistribution } from '../../../analysis/split/monte-carlo-interval.ts';
import { compared, verdictText } from '../../../analysis/split/monte-carlo-verdict.ts';
import type { Quantified } from '../../../analysis/split/results.ts';

const byFit: Quantified = { value: 0.5, standardUncertainty: 0.01, interval95: [0.48, 0.52] };

function redraws(low: number, high: number): DrawnDistribution {
  const interval = { low, high, lowError: 0.001, highError: 0.001 };
  return {
    mean: (low + high) / 2,
    standardDeviation: (high - low) / 4,
    symmetric95: interval,
    shortest95: { ...interval, low: low - 0.1 },
  };
}

const said = (fit: Quantified, drawn: DrawnDistribution): string =>
  verdictText([{ name: 'mono', comparison: compared(fit, drawn, 1) }], 2000);

describe('how the redraws stand to the fit', () => {
  it('agrees within the chance of the draws', () => {
    // three errors of 0.001 and 2 % of 0.04 allow 0.0038
    expect(compared(byFit, redraws(0.4763, 0.5237), 1).verdict).toBe('agree');
    expect(said(byFit, redraws(0.479, 0.52))).toContain('agree within the chance');
  });

  it('differs beyond it at either end, and says by how much', () => {
    expect(compared(byFit, redraws(0.475, 0.52), 1).verdict).toBe('differ');
    expect(compared(byFit, redraws(0.48, 0.525), 1).verdict).toBe('differ');
    expect(said(byFit, redraws(0.46, 0.54))).toContain('mono (100 % wider)');
    expect(said(byFit, redraws(0.49, 0.51))).toContain('mono (50 % narrower)');
    expect(said(byFit, redraws(0.49, 0.53))).toContain('of the same width, but displaced');
    expect(said(byFit, redraws(0.46, 0.54))).not.toContain('agree');
  });

  it.each([
    ['the fit reaches nothing', [0, 0.04], 0.02],
    ['the fit reaches all', [0.96, 1], 0.98],
    ['the value is within four standard uncertainties of nothing', [0.015, 0.055], 0.035],
  ] as const)('is not compared near a bound: %s', (_, interval95, value) => {
    const near: Quantified = { value, standardUncertainty: 0.01, interval95 };
    const comparison = compared(near, redraws(0.3, 0.6), 1);
    expect(comparison.verdict).toBe('near-bound');
    expect(comparison.interval.low).toBeCloseTo(0.2, 12); // the shortest
    expect(said(near, redraws(0.3, 0.6))).toMatch(/^Near a bound \(mono\)/);
  });

  it('is not compared without bounds', () => {
    const open: Quantified = { ...byFit, interval95: [0.48, null] };
    expect(said(open, redraws(0.48, 0.52))).toBe('Not bounded, and so not compared: mono.');
    expect(compared(byFit, redraws(0.48, Number.POSITIVE_INFINITY), 1).verdict).toBe('unbounded');
  });
});
