import type { Conditions } from '../analysis/simulated.ts';
import { type Coverage, coverageOf, percent, shareError } from './redraw.ts';

const fractions = [0, 0.005, 0.05, 0.5, 0.95, 0.995];
const absorbances = [0.1, 0.5, 1.5];
const steps = [2, 1, 0.2];
const smoothings = [1, 5];
const seedsOfCell = 1_000_000;

/** Coverage of nominal 95 % intervals of the mono fraction over the grid of conditions, noise estimated from the data. */
export function coverage(draws: number): void {
  console.log(
    `Coverage of 95 % intervals of the mono fraction, ${draws} redraws a cell (Monte Carlo error ${percent(shareError(0.95, draws))}), noise estimated`,
  );
  console.log(
    `step nm  points smoothed  absorbance  ${fractions.map((f) => `f=${f}`.padStart(8)).join('')}`,
  );
  const cells: Coverage[] = [];
  let cellsBefore = 0;
  for (const stepNm of steps) {
    for (const smoothing of smoothings) {
      for (const absorbance of absorbances) {
        const row = fractions.map((fraction) =>
          coverageOf(
            draws,
            { fraction, absorbance, stepNm, smoothing },
            // every cell has draws of its own
            1 + cellsBefore++ * seedsOfCell,
          ),
        );
        cells.push(...row);
        const shown = row.map(({ inside }) => percent(inside / draws).padStart(8)).join('');
        console.log(
          `${String(stepNm).padStart(7)}  ${String(smoothing).padStart(15)}  ${String(absorbance).padStart(10)}  ${shown}`,
        );
      }
    }
  }
  summary(cells);
}

function summary(cells: readonly Coverage[]): void {
  const all = cells.reduce((sum, { draws }) => sum + draws, 0);
  const inside = cells.reduce((sum, cell) => sum + cell.inside, 0);
  const shares = cells.map((cell) => cell.inside / cell.draws);
  const outside = shares.filter((share) => share < 0.93 || share > 0.97).length;
  console.log(
    `overall ${percent(inside / all)} of ${all} (error ${percent(shareError(0.95, all))}); lowest cell ${percent(Math.min(...shares))}, highest ${percent(Math.max(...shares))}; ${outside} of ${cells.length} cells outside 93 to 97 %`,
  );
}

/** Several faults at once: offset in wavelength, smoothing, standards' errors, stray light, noise estimated. */
export function faultsTogether(draws: number): void {
  console.log(
    `All faults together (0.3 nm offset, smoothing over 5 points, stray light 0.05 %, standards' errors, noise estimated), ${draws} redraws (error ${percent(shareError(0.95, draws))})`,
  );
  const faults: Partial<Conditions> = { shiftNm: 0.3, smoothing: 5, strayLight: 0.0005 };
  const fits: readonly (readonly [string, Conditions['fit']])[] = [
    ['offset and stray light fitted', { shift: 'common', strayLight: 'fit' }],
    ['offset fitted, stray light stated', { shift: 'common', strayLight: 0.0005 }],
  ];
  for (const [name, fit] of fits) {
    for (const [fraction, absorbance] of [
      [0.05, 1.5],
      [0.5, 1.5],
      [0.95, 1.5],
      [0.5, 0.5],
    ] as const) {
      const { inside } = coverageOf(draws, { ...faults, fraction, absorbance, fit });
      console.log(
        `  ${name.padEnd(36)} f=${fraction} absorbance ${absorbance}: ${percent(inside / draws)}`,
      );
    }
  }
}
