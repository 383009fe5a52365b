import { describe, expect, it } from 'vitest';
import { linearityOf } from '../../../analysis/standards/linearity.ts';
import { normal } from '../synthetic.ts';
import { madeSolution, type Recipe } from './solutions.ts';

type Change = Omit<Recipe, 'standard' | 'peak'>;

function series(gauss: () => number, peaks: readonly number[], change: Change = {}) {
  return peaks.map((peak, i) =>
    madeSolution(gauss, {
      scaleError: 0.01 * gauss(),
      offset: 1e-3 * gauss(),
      ...change,
      standard: `S${i + 1}`,
      peak,
    }),
  );
}

function flagged(draws: number, peaks: readonly number[], change: Change = {}): number {
  const gauss = normal(4);
  let count = 0;
  for (let draw = 0; draw < draws; draw++) {
    const { curvature } = linearityOf(series(gauss, peaks, change));
    if (curvature && curvature.pValue < 0.01) count++;
  }
  return count / draws;
}

describe('linearity of standards', () => {
  // wrong concentrations (1 %) and offsets (1 mAU) of the solutions are in all of these
  it.each([
    ['two solutions', 2000, [0.4, 0.9], {}],
    ['five solutions', 1000, [0.3, 0.6, 0.9, 1.2, 1.5], {}],
    ['an instrument that smooths over 5 points', 1000, [0.3, 0.9], { smoothing: 5 }],
    ['ten times the noise', 1000, [0.2, 0.4, 0.9], { noisier: 10 }],
  ] as const)(
    '%s: the chance that is given of solutions that follow Beer-Lambert holds at 1 %',
    (_, draws, peaks, change) => {
      // over 16,000 draws of two solutions it was 0.94 %; standard error here 0.22 % or 0.31 %, three of them
      const allowance = 3 * Math.sqrt((0.01 * 0.99) / draws);
      const share = flagged(draws, peaks, change);
      expect(share).toBeLessThan(0.01 + allowance);
      expect(share).toBeGreaterThan(0.01 - allowance);
    },
  );

  it('sees 0.1 % of stray light in standards up to 1.5 every time, and up to where they are straight', () => {
    const gauss = normal(5);
    for (let draw = 0; draw < 50; draw++) {
      const found = linearityOf(series(gauss, [0.3, 0.6, 0.9, 1.2, 1.5], { strayLight: 1e-3 }));
      expect(found.isBent).toBe(true);
      // the strongest reads 1.487 for 1.5, and what is left in proportion is taken up by the scale
      expect(found.curvature?.relativeDeparture).toBeLessThan(-0.004);
      expect(found.curvature?.relativeDeparture).toBeGreaterThan(-0.02);
      expect(found.straightUpTo).toBeGreaterThan(0.4);
      expect(found.straightUpTo).toBeLessThan(1.4);
    }
  });

  it('finds the curvature that was put in', () => {
    const gauss = normal(8);
    const bent = series(gauss, [0.3, 0.6, 0.9]).map((solution) => {
      const perEpsilon = (solution.largestAbsorbance ?? 1) / Math.max(...solution.epsilon);
      const q = -0.02;
      return {
        ...solution,
        epsilon: solution.epsilon.map((value) => value * (1 + q * perEpsilon * value)),
      };
    });
    const { curvature } = linearityOf(bent);
    if (!curvature) throw new Error('not tested');
    expect(Math.abs(curvature.perAbsorbance + 0.02)).toBeLessThan(
      3 * curvature.standardUncertainty + 0.02 * 0.02 * 3, // second order in q
    );
  });

  it('says nothing of one solution, or of several of one strength', () => {
    const gauss = normal(2);
    expect(linearityOf(series(gauss, [0.9])).curvature).toBeNull();
    expect(linearityOf(series(gauss, [0.9, 0.9], { scaleError: 0 })).curvature).toBeNull();
  });
});
