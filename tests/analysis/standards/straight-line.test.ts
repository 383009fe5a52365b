import { describe, expect, it } from 'vitest';
import { straightLine } from '../../../analysis/standards/straight-line.ts';
import { normal } from '../synthetic.ts';

const sdOf = (weights: readonly number[]) => Float64Array.from(weights, (w) => 1 / Math.sqrt(w));

describe('a straight line with noise in both coordinates', () => {
  it("is York's on Pearson's points with York's weights", () => {
    // Pearson 1901 with the weights of York 1966; answers as in York et al., Am. J. Phys. 72 (2004) 367.
    // x is turned round: only rising lines are of use here
    const line = straightLine({
      x: Float64Array.of(0, -0.9, -1.8, -2.6, -3.3, -4.4, -5.2, -6.1, -6.5, -7.4),
      y: Float64Array.of(5.9, 5.4, 4.4, 4.6, 3.5, 3.7, 2.8, 2.8, 2.4, 1.5),
      sdX: sdOf([1000, 1000, 500, 800, 200, 80, 60, 20, 1.8, 1]),
      sdY: sdOf([1, 1.8, 4, 8, 20, 20, 70, 70, 100, 500]),
    });
    // as many figures as are printed there
    expect(line?.slope).toBeCloseTo(0.4805334, 6);
    expect(line?.intercept).toBeCloseTo(5.4799102, 6);
    expect(Math.sqrt(line?.slopeVariance ?? 0)).toBeCloseTo(0.058, 3);
    expect(Math.sqrt(line?.interceptVariance ?? 0)).toBeCloseTo(0.295, 3);
  });

  it('is not flattened by noise in x, and knows its own uncertainty', () => {
    const gauss = normal(3);
    const truth = Float64Array.from({ length: 60 }, (_, i) => i / 60);
    const [draws, slope, sd] = [1000, 0.4, 0.05];
    let [sum, squares] = [0, 0];
    for (let draw = 0; draw < draws; draw++) {
      const line = straightLine({
        x: truth.map((value) => value + sd * gauss()),
        y: truth.map((value) => 0.1 + slope * value + sd * gauss()),
        sdX: truth.map(() => sd),
        sdY: truth.map(() => sd),
      });
      if (!line) throw new Error('no line');
      sum += line.slope;
      squares += (line.slope - slope) ** 2 / line.slopeVariance;
    }
    // standard error of the mean 0.0008; an ordinary fit would give 0.388
    expect(Math.abs(sum / draws - slope)).toBeLessThan(0.0024);
    // of a mean of 1,000 squares of standard normals: 0.045
    expect(Math.abs(squares / draws - 1)).toBeLessThan(0.15);
  });

  it('is none where nothing rises or too few points are there', () => {
    const flat = new Float64Array(20).fill(1);
    expect(straightLine({ x: flat, y: flat, sdX: flat, sdY: flat })).toBeNull();
    const three = Float64Array.of(1, 2, 3);
    expect(straightLine({ x: three, y: three, sdX: three, sdY: three })).toBeNull();
  });
});
