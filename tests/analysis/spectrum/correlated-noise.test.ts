import { describe, expect, it } from 'vitest';
import {
  correlate,
  inflationOf,
  levelOf,
  type NoiseSample,
  noiseCorrelation,
  smoothed,
} from '../../../analysis/spectrum/correlated-noise.ts';
import { orthonormal, projectedOut } from '../../../analysis/spectrum/vectors.ts';
import { normal } from '../synthetic.ts';

const runningMean = [1, 1, 1, 1, 1];
/** Local parabola over five points (Savitzky and Golay 1964). */
const parabola = [-3, 12, 17, 12, -3];

/** Residual of a fit of an offset and four bands to white noise smoothed by a kernel. */
function residual(points: number, kernel: readonly number[], gauss: () => number): NoiseSample {
  const white = Float64Array.from({ length: points + kernel.length }, gauss);
  const length = Math.hypot(...kernel);
  const noise = Float64Array.from({ length: points }, (_, i) =>
    kernel.reduce((sum, weight, k) => sum + (weight * (white[i + k] ?? 0)) / length, 0),
  );
  const bands = [0.2, 0.4, 0.6, 0.8].map((centre) =>
    Float64Array.from({ length: points }, (_, i) =>
      Math.exp(-0.5 * ((i / points - centre) / 0.1) ** 2),
    ),
  );
  const basis = orthonormal([new Float64Array(points).fill(1), ...bands]);
  return { values: projectedOut(basis, noise), used: new Uint8Array(points).fill(1), basis };
}

function means(points: number, kernel: readonly number[], draws: number) {
  const gauss = normal(11);
  let [inflation, level] = [0, 0];
  for (let draw = 0; draw < draws; draw++) {
    const sample = residual(points, kernel, gauss);
    const correlation = noiseCorrelation([sample]);
    inflation += inflationOf(correlation) / draws;
    level += levelOf(sample, correlation.rho).variance / draws;
  }
  return { inflation, level };
}

// 200 draws; one inflation scatters by some 20 % of itself (measured), so its mean by 1.5 %: four of
// those and the bias of a few percent that 211 points leave
const within = 0.1;

describe('the correlation of noise', () => {
  it('is none for white noise', () => {
    expect(Math.abs(means(211, [1], 200).inflation - 1)).toBeLessThan(0.03);
  });

  it.each([
    ['a running mean of five points', runningMean, 5],
    ['a local parabola over five points', parabola, 35 ** 2 / 595],
  ])('is found after %s', (_, kernel, truth) => {
    const { inflation, level } = means(211, kernel, 200);
    expect(Math.abs(inflation / truth - 1)).toBeLessThan(within);
    // what the fit took out of smoothed noise is put back: unit variance in, unit variance out
    expect(Math.abs(level - 1)).toBeLessThan(within);
  });

  it('is seen to matter: without it the same residual looks far too quiet', () => {
    const gauss = normal(5);
    const sample = residual(106, Array(9).fill(1), gauss);
    const plain = levelOf(sample, Float64Array.of(1)).variance;
    const { rho } = noiseCorrelation([sample]);
    expect(levelOf(sample, rho).variance).toBeGreaterThan(1.1 * plain);
  });

  it('is a kernel and its autocorrelation, one and the same', () => {
    const { rho, kernel } = noiseCorrelation([residual(500, runningMean, normal(3))]);
    const unit = new Float64Array(101);
    unit[50] = 1;
    const twice = smoothed(kernel, smoothed(kernel, unit));
    const once = correlate(rho, unit);
    for (const [i, value] of once.entries()) expect(twice[i]).toBeCloseTo(value, 12);
  });

  it('makes nothing of too few points', () => {
    expect(noiseCorrelation([residual(20, runningMean, normal(1))]).rho).toEqual(
      Float64Array.of(1),
    );
  });
});
