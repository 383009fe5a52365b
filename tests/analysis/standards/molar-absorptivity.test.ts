import { describe, expect, it } from 'vitest';
import { prepare } from '../../../analysis/quantify.ts';
import { molarAbsorptivityAt } from '../../../analysis/standards/molar-absorptivity.ts';
import type { SpeciesStandard } from '../../../analysis/standards/species-standard.ts';
import { simulated } from '../simulated.ts';

const grid = Float64Array.from({ length: 101 }, (_, i) => 250.3 + i);

function someStandard(): SpeciesStandard {
  const [standard] = prepare(simulated({}).sheet, new Map()).library.standards;
  if (!standard) throw new Error('the simulated sheet has standards');
  return standard;
}

describe('ε on a grid', () => {
  it('is the same to the bit when asked for again, between other grids', () => {
    const standard = someStandard();
    const first = molarAbsorptivityAt(standard, grid);
    for (let shift = 1; shift < 8; shift++) {
      molarAbsorptivityAt(
        standard,
        grid.map((nm) => nm + 0.1 * shift),
      );
      expect(molarAbsorptivityAt(standard, grid.slice())).toEqual(first);
    }
  });

  it('follows a grid that was changed in place', () => {
    const standard = someStandard();
    const moving = grid.slice();
    const before = molarAbsorptivityAt(standard, moving);
    moving.set(grid.map((nm) => nm + 5));
    const after = molarAbsorptivityAt(standard, moving);
    expect(after.epsilon[0]).toBe(before.epsilon[5]);
    expect(after.epsilon[0]).not.toBe(before.epsilon[0]);
  });
});
