import { describe, expect, it } from 'vitest';
import { Refusal, windowMap } from '../../analysis/index.ts';
import { first, noFiles } from './fitted.ts';
import { syntheticSheet } from './synthetic.ts';

const cellsOf = (sheet: Parameters<typeof windowMap>[0]) =>
  windowMap(sheet, noFiles, 'a1')
    .rows.flat()
    .filter((cell) => cell !== null);

describe('the map of windows', () => {
  it('begins with the whole window and the answer that the fit gives', () => {
    const sheet = syntheticSheet();
    const [whole] = cellsOf(sheet);
    expect(whole?.windowNm).toEqual([240, 450]);
    expect(whole?.departureSd).toBeCloseTo(0, 12);
    expect(whole?.fraction).toBeCloseTo(first(sheet).split[0]?.fraction.value ?? 0, 9);
  });

  it('departs in about one cell of twenty where the standards make all of the window', () => {
    let [departs, all] = [0, 0];
    for (let seed = 1; seed <= 40; seed++) {
      const cells = cellsOf(syntheticSheet({ seed })).slice(1);
      departs += cells.filter(({ agrees }) => !agrees).length;
      all += cells.length;
    }
    // cells of one map lean on each other: 40 maps tell 5 % to within some 3 %
    expect(departs / all).toBeLessThan(0.12);
    expect(departs).toBeGreaterThan(0);
  });

  it('shows the part of the window that says something else', () => {
    const extra = (nm: number) => 0.03 * Math.exp(-0.5 * ((nm - 252) / 8) ** 2);
    const cells = cellsOf(syntheticSheet({ extra }));
    expect(cells.some(({ agrees }) => !agrees)).toBe(true);
  });

  it('is refused for an aliquot that is not there', () => {
    expect(() => windowMap(syntheticSheet(), noFiles, 'nobody')).toThrow(Refusal);
  });
});
