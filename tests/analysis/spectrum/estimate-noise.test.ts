import { describe, expect, it } from 'vitest';
import {
  estimateNoise,
  levelsOfSquares,
  twoParts,
} from '../../../analysis/spectrum/estimate-noise.ts';
import { absorbanceVariance, type NoiseModel } from '../../../analysis/spectrum/noise.ts';
import { epsilonAt, normal, usual } from '../synthetic.ts';

const nm = Float64Array.from({ length: 401 }, (_, i) => 230 + 0.5 * i);
const clean = nm.map((at) => 1.8e-5 * epsilonAt(usual.bands.mono ?? [], at) * 4);

function noisy(noise: NoiseModel, seed: number): Float64Array {
  const gauss = normal(seed);
  return clean.map((value) => value + Math.sqrt(absorbanceVariance(noise, value)) * gauss());
}

describe('the noise of one spectrum', () => {
  it('is next to nothing where there is none, however strong the bands', () => {
    const found = estimateNoise(nm, clean);
    expect(Math.hypot(found?.constant ?? 1, found?.transmittance ?? 1)).toBeLessThan(1e-5);
  });

  it('is that of the instrument under bands', () => {
    const found = estimateNoise(nm, noisy({ constant: 4e-4, transmittance: 0 }, 2));
    // 401 points by medians: 8 % scatter, three of those
    expect(Math.abs((found?.constant ?? 0) / 4e-4 - 1)).toBeLessThan(0.25);
  });

  it('does not see spikes', () => {
    const values = noisy({ constant: 4e-4, transmittance: 0 }, 3);
    for (const i of [30, 140, 250, 360]) values[i]! += 0.2;
    const found = estimateNoise(nm, values);
    expect(Math.hypot(found?.constant ?? 1, found?.transmittance ?? 1)).toBeLessThan(6e-4);
  });

  it('parts constant noise from that of transmittance by the squares of a residual', () => {
    const truth = { constant: 3e-4, transmittance: 2e-4 };
    const [rounds, sum] = [40, { constant: 0, transmittance: 0 }];
    for (let seed = 1; seed <= rounds; seed++) {
      const residual = noisy(truth, seed).map((value, i) => value - clean[i]!);
      const expected = {
        flat: new Float64Array(nm.length).fill(1),
        rise: clean.map((value) => 100 ** value),
      };
      const found = twoParts(levelsOfSquares(residual, expected, 1), 0);
      sum.constant += found.constant ** 2 / rounds;
      sum.transmittance += found.transmittance ** 2 / rounds;
    }
    // each variance scatters by 15 to 20 % (measured), the mean of 40 by 3 %: four of those
    expect(Math.abs(sum.constant / truth.constant ** 2 - 1)).toBeLessThan(0.12);
    expect(Math.abs(sum.transmittance / truth.transmittance ** 2 - 1)).toBeLessThan(0.12);
  });
});
