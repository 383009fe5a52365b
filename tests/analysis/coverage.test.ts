import { describe, expect, it } from 'vitest';
import { prepare, quantifyAliquot, type Sheet } from '../../analysis/index.ts';
import { holds, noFiles } from './fitted.ts';
import { type Conditions, simulated } from './simulated.ts';

/** Share of redraws, seeds 1 to `redraws`, in which the interval of the mono fraction holds the truth. */
function coverage(
  redraws: number,
  changes: Partial<Conditions>,
  altered: (sheet: Sheet) => Sheet = (sheet) => sheet,
): number {
  const { fraction = 0.5 } = changes;
  let inside = 0;
  for (let seed = 1; seed <= redraws; seed++) {
    const sheet = altered(simulated({ ...changes, seed }).sheet);
    const aliquot = sheet.aliquots?.[0];
    if (!aliquot) throw new Error('no aliquot');
    const { result } = quantifyAliquot(prepare(sheet, noFiles), aliquot, noFiles);
    const split = result.split[0];
    if (split && holds(split.fraction, fraction)) inside++;
  }
  return inside / redraws;
}

const withoutStandardsErrors = (sheet: Sheet): Sheet => ({
  ...sheet,
  stocks: (sheet.stocks ?? []).map((stock) => ({ ...stock, relativeStandardUncertainty: 0 })),
  standards: (sheet.standards ?? []).map((standard) => ({
    ...standard,
    relativeStandardUncertainty: 0,
  })),
});

// 150 redraws at 95 %: the standard deviation of a coverage is 1.8 %, so 89 % is three of them below
const redraws = 150;
const lowest = 0.89;

describe('95 % intervals over redraws of standards, offset and noise', () => {
  it('hold the truth with a single standard each', () => {
    expect(coverage(redraws, { standards: [0.9], stepNm: 2 })).toBeGreaterThan(lowest);
  });

  it('are seen to fail when the uncertainties of the standards are dropped', () => {
    const dropped = coverage(redraws, { standards: [0.9], stepNm: 2 }, withoutStandardsErrors);
    expect(dropped).toBeLessThan(0.6);
  });

  it('hold the truth on an instrument that smooths over five points', () => {
    const conditions = { smoothing: 5, fraction: 0.005, absorbance: 0.5 };
    expect(coverage(redraws, conditions)).toBeGreaterThan(lowest);
  });

  it('hold the truth where there is no mono at all', () => {
    expect(coverage(redraws, { fraction: 0, stepNm: 2 })).toBeGreaterThan(lowest);
  });
});
