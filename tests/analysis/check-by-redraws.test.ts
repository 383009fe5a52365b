import { describe, expect, it } from 'vitest';
import {
  checkByRedraws,
  type RedrawCheck,
  type RedrawnQuantity,
  Refusal,
} from '../../analysis/index.ts';
import { type Conditions, simulated } from './simulated.ts';

const noFiles = new Map();
const draws = 400;

function checked(changes: Partial<Conditions>, seed = 1, asked = draws): RedrawCheck {
  const { sheet } = simulated(changes);
  const work = checkByRedraws(sheet, noFiles, 'a1', { draws: asked, seed });
  let step = work.next();
  while (!step.done) step = work.next();
  return step.value;
}

function quantity(
  { quantities }: RedrawCheck,
  kind: RedrawnQuantity['kind'],
  species: string,
): RedrawnQuantity {
  const found = quantities.find((each) => each.kind === kind && each.species === species);
  if (!found) throw new Error(`no ${kind} of ${species}`);
  return found;
}

/** Standard deviation by redraws over standard uncertainty by the fit. */
function spread({ byFit, byRedraws }: RedrawnQuantity): number {
  return byRedraws.standardDeviation / (byFit.standardUncertainty ?? Number.NaN);
}

/** Four Monte Carlo errors of a standard deviation, 1/√(2n) each, and 3 % for what is not linear. */
const allowed = 4 / Math.sqrt(2 * draws) + 0.03;

describe('the check by redraws', () => {
  it('gives the same for the same seed, and other draws for another', () => {
    const one = checked({}, 5, 100);
    expect(checked({}, 5, 100)).toEqual(one);
    expect(checked({}, 6, 100).quantities).not.toEqual(one.quantities);
  });

  it.each([
    ['errors of scale that rule all others', { stock: 0.02, dilution: 0.02 }],
    ['noise alone, independent', { stock: 0, dilution: 0, exactStandards: true }],
    ['noise alone, smoothed', { stock: 0, dilution: 0, exactStandards: true, smoothing: 5 }],
    [
      'noise of crude and standards alike',
      { stock: 0, dilution: 0, noise: { constant: 2e-3, transmittance: 1e-3 } },
    ],
  ] as const)('scatters as much as the fit says: %s', (_, changes) => {
    const check = checked(changes);
    for (const row of [
      quantity(check, 'fraction', 'mono'),
      quantity(check, 'cuvette', 'mono'),
      quantity(check, 'cuvette', 'bis'),
    ]) {
      expect(Math.abs(spread(row) - 1)).toBeLessThan(allowed);
      // about the answer itself: four errors of a mean, and a tenth of u for what is not linear
      const { mean, standardDeviation } = row.byRedraws;
      const off = Math.abs(mean - (row.byFit.value ?? Number.NaN));
      expect(off).toBeLessThan((4 / Math.sqrt(draws) + 0.1) * standardDeviation);
    }
    expect(check.verdict).toContain('agree');
  });

  it('sees an interval that leaves a source out', () => {
    // the sheet knows nothing of 2 % on each stock: the redraws of a sheet that does are far wider
    const told = quantity(checked({ stock: 0.02 }), 'fraction', 'mono');
    const untold = quantity(checked({ stock: 0 }), 'fraction', 'mono');
    expect(told.byRedraws.standardDeviation).toBeGreaterThan(
      3 * (untold.byFit.standardUncertainty ?? Number.NaN),
    );
  });

  it('fits a free wavelength offset each time', () => {
    const fit: Conditions['fit'] = {
      shift: 'common',
      shiftStandardUncertaintyNm: 0.05,
      noise: { constant: 3e-4, transmittance: 2e-4 },
    };
    const few = 150;
    const row = quantity(
      checked({ stock: 0, dilution: 0, exactStandards: true, stepNm: 4, fit }, 2, few),
      'fraction',
      'mono',
    );
    expect(Math.abs(spread(row) - 1)).toBeLessThan(4 / Math.sqrt(2 * few) + 0.03);
  });

  it('does not go below nothing, and does not compare what a bound sets apart', () => {
    const check = checked({ fraction: 0, dilution: 0 });
    const row = quantity(check, 'fraction', 'mono');
    expect(row.comparison.verdict).toBe('near-bound');
    expect(row.comparison.interval.low).toBeGreaterThanOrEqual(0);
    expect(check.verdict).toContain('Near a bound');
  });

  it('says how far it is after every draw, and can be left at any', () => {
    const { sheet } = simulated({});
    const work = checkByRedraws(sheet, noFiles, 'a1', { draws: 200 });
    expect([work.next().value, work.next().value, work.next().value]).toEqual([1, 2, 3]);
    work.return({ aliquot: '', draws: 0, seed: 0, quantities: [], verdict: '' });
    expect(work.next().done).toBe(true);
  });

  it.each([0, 99, 150.5, 1e9, Number.NaN])('refuses %d draws', (asked) => {
    expect(() => checked({}, 1, asked)).toThrow(Refusal);
  });

  it('refuses an aliquot that is not there', () => {
    const { sheet } = simulated({});
    expect(() => checkByRedraws(sheet, noFiles, 'nowhere').next()).toThrow('no aliquot "nowhere"');
  });
});
