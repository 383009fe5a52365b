import { describe, expect, it } from 'vitest';
import { molarAbsorptivityAt } from '../../../analysis/standards/molar-absorptivity.ts';
import type { Solution } from '../../../analysis/standards/solution.ts';
import {
  combineSolutions,
  type SpeciesStandard,
} from '../../../analysis/standards/species-standard.ts';
import { factorise } from '../../../analysis/unmixing/orthogonal.ts';
import { type Bands, epsilonAt, normal, usual } from '../synthetic.ts';
import { madeSolution, monoBands, type Recipe, usualNm } from './solutions.ts';

type Gauss = () => number;
const truth = usualNm.map((nm) => epsilonAt(monoBands, nm));

/** Scale of an ε against the truth, less 1, with a constant free. */
function scaleOff(epsilon: Float64Array): number {
  const [slope = Number.NaN] = factorise([truth, truth.map(() => 1)]).solve(epsilon);
  return slope - 1;
}

function epsilonOf(standard: SpeciesStandard): Float64Array {
  return molarAbsorptivityAt(standard, usualNm).epsilon;
}

function three(gauss: Gauss, offset: number, change: Partial<Recipe> = {}): Solution[] {
  return [0.3, 0.6, 0.9].map((peak, i) =>
    madeSolution(gauss, {
      ...change,
      standard: `S${i + 1}`,
      peak,
      offset: i === 1 ? offset : 0,
    }),
  );
}

/** The solutions joined by one who knows that they have no offsets and no errors of scale. */
function joinedKnowingly(solutions: readonly Solution[]): SpeciesStandard {
  return { ...combineSolutions(solutions), solutions, factors: solutions.map(() => 1) };
}

const amounts = [8e-6, 2e-5, 1.2e-5];
const bandsOf: readonly Bands[] = [usual.bands.arm ?? [], monoBands, usual.bands.bis ?? []];

/** Mean and variance of the fraction of mono, its standards combined by `combine`, over redraws. */
function fractions(
  draws: number,
  offset: number,
  combine: (solutions: readonly Solution[]) => SpeciesStandard,
  baseline: 'none' | 'offset',
): { mean: number; variance: number } {
  const gauss = normal(21);
  let [sum, squares] = [0, 0];
  for (let draw = 0; draw < draws; draw++) {
    const columns = bandsOf.map((bands, k) =>
      epsilonOf(combine(three(gauss, k === 1 ? offset : 0, { bands }))),
    );
    if (baseline === 'offset') columns.push(truth.map(() => 1));
    const crude = usualNm.map(
      (nm) =>
        bandsOf.reduce((all, bands, k) => all + amounts[k]! * epsilonAt(bands, nm), 0) +
        4e-4 * gauss(),
    );
    const [, mono = 0, bis = 0] = factorise(columns).solve(crude);
    const off = mono / (mono + bis) - 0.625;
    sum += off;
    squares += off * off;
  }
  const mean = sum / draws;
  return { mean, variance: squares / draws - mean * mean };
}

describe('one of three solutions with an offset of its own', () => {
  it.each([0.005, 0.02])('of %f leaves ε unbiased, shape, scale and constant', (offset) => {
    const gauss = normal(31);
    const draws = 300;
    const mean = new Float64Array(truth.length);
    for (let draw = 0; draw < draws; draw++) {
      for (const [i, value] of epsilonOf(combineSolutions(three(gauss, offset))).entries()) {
        mean[i]! += value / draws;
      }
    }
    // noise of one ε at the top: about 12 L/mol/cm, of the mean of 300 some 0.7; left in it would be 45 and 180
    for (const [i, value] of mean.entries()) expect(Math.abs(value - truth[i]!)).toBeLessThan(4);
    // 0.03 % of noise each: 0.002 % for the mean
    expect(Math.abs(scaleOff(mean))).toBeLessThan(1e-4);
  });

  it.each([
    [0.005, 'offset'],
    [0.02, 'offset'],
    [0.005, 'none'],
    [0.02, 'none'],
  ] as const)('of %f leaves the amounts unbiased, baseline fitted as %s', (offset, baseline) => {
    const draws = 200;
    const { mean, variance } = fractions(draws, offset, combineSolutions, baseline);
    const standardError = Math.sqrt(variance / draws);
    expect(Math.abs(mean)).toBeLessThan(3.5 * standardError);
    // what is to be seen: left in, it moves the fraction by 15 standard errors at the least
    const leftIn = fractions(draws, offset, joinedKnowingly, baseline);
    expect(Math.abs(leftIn.mean)).toBeGreaterThan(10 * standardError);
  });

  it('is reported in absorbance, and what it was recorded at does not matter', () => {
    for (const strongest of [0, 1, 2]) {
      const gauss = normal(5);
      const solutions = [0.2, 0.4, 0.9].map((peak, i) =>
        madeSolution(gauss, { standard: `S${i}`, peak, offset: i === strongest ? 0.02 : 0 }),
      );
      const { offsets } = combineSolutions(solutions);
      for (const [i, value] of offsets.entries()) {
        // 0.1 mAU of noise; up to 0.3 mAU for what the one that stands apart still pulls
        expect(Math.abs(value - (i === strongest ? 0.02 : 0))).toBeLessThan(4e-4);
      }
    }
  });

  it('makes no step where the strong solution ends', () => {
    const gauss = normal(6);
    const epsilon = epsilonOf(
      combineSolutions(
        [0.3, 0.9, 3].map((peak, i) =>
          madeSolution(gauss, { standard: `S${i}`, peak, offset: i === 0 ? 0.02 : 0 }),
        ),
      ),
    );
    // an offset of 20 mAU in the weakest is 1,070 in ε, in the second 360; noise is up to 20
    for (const [i, value] of epsilon.entries()) {
      expect(Math.abs(value - truth[i]!)).toBeLessThan(100);
    }
  });
});

describe('without an offset', () => {
  it.each(['offset', 'none'] as const)(
    'nothing is lost against joining them with everything known (baseline %s)',
    (baseline) => {
      const free = fractions(200, 0, combineSolutions, baseline).variance;
      const known = fractions(200, 0, joinedKnowingly, baseline).variance;
      // the same draws: the ratio of the standard deviations is known to 0.3 %
      expect(Math.sqrt(free / known)).toBeLessThan(1.01);
    },
  );

  it('noise in the solutions does not make the scale small', () => {
    const gauss = normal(41);
    let sum = 0;
    const draws = 400;
    for (let draw = 0; draw < draws; draw++) {
      sum += scaleOff(epsilonOf(combineSolutions(three(gauss, 0, { noisier: 10 }))));
    }
    // standard error 0.01 %; lines with noise in one coordinate only give -0.13 % here
    expect(Math.abs(sum / draws)).toBeLessThan(4e-4);
  });
});

describe('the uncertainty of the scale', () => {
  const u = 0.003;
  const stockU = 0.005;

  function coverage(draws: number, offset: number, told: Partial<Recipe> = {}): number {
    const gauss = normal(51);
    let inside = 0;
    for (let draw = 0; draw < draws; draw++) {
      const stock = stockU * gauss();
      const solutions = [0.3, 0.6, 0.9].map((peak, i) =>
        madeSolution(gauss, {
          standard: `S${i}`,
          peak,
          u,
          stockU,
          scaleError: stock + u * gauss(),
          offset: i === 0 ? offset : 0,
          ...told,
        }),
      );
      const standard = combineSolutions(solutions);
      const off = Math.abs(scaleOff(epsilonOf(standard)));
      if (off <= 1.96 * standard.relativeScaleUncertainty) inside++;
    }
    return inside / draws;
  }

  it.each([0, 0.005, 0.02])('covers the scale in 95 %, one solution offset by %f', (offset) => {
    const share = coverage(2000, offset);
    // 2,000 redraws: standard error 0.5 %
    expect(share).toBeGreaterThan(0.94);
    expect(share).toBeLessThan(0.96);
  });

  it('is seen to fail when the sheet leaves out what the stock and the dilutions have', () => {
    expect(coverage(300, 0, { u: 0, stockU: 0 })).toBeLessThan(0.7);
  });
});

describe('scales that disagree', () => {
  it('name the solution that stands apart, and by how much', () => {
    const gauss = normal(61);
    const solutions = [0, 0, 0.08, 0].map((scaleError, i) =>
      madeSolution(gauss, { standard: `S${i + 1}`, peak: 0.3 + 0.2 * i, u: 0.003, scaleError }),
    );
    const { agreement } = combineSolutions(solutions);
    expect(agreement?.apart?.standard).toBe('S3');
    expect(agreement?.apart?.relative).toBeCloseTo(0.08, 3);
  });

  it('name none of two', () => {
    const gauss = normal(62);
    const pair = [0, 0.08].map((scaleError, i) =>
      madeSolution(gauss, { standard: `S${i + 1}`, peak: 0.4 + i / 2, u: 0.003, scaleError }),
    );
    const { agreement } = combineSolutions(pair);
    expect(agreement && agreement.chiSquare > agreement.limit).toBe(true);
    expect(agreement?.apart).toBeNull();
  });

  it('scatter as χ² has it where they do agree', () => {
    const gauss = normal(63);
    const draws = 2000;
    let called = 0;
    for (let draw = 0; draw < draws; draw++) {
      const solutions = [0.3, 0.6, 0.9].map((peak, i) =>
        madeSolution(gauss, { standard: `S${i}`, peak, u: 0.003, scaleError: 0.003 * gauss() }),
      );
      const { agreement } = combineSolutions(solutions);
      // upper 1 % of χ² with two degrees of freedom
      if (agreement && agreement.chiSquare > 9.21034) called++;
    }
    // standard error 0.22 %
    expect(Math.abs(called / draws - 0.01)).toBeLessThan(0.0067);
  });
});

describe('laws', () => {
  it('the order of the solutions does not matter', () => {
    const solutions = three(normal(71), 0.005, { u: 0.003 });
    const forth = combineSolutions(solutions);
    const back = combineSolutions([...solutions].reverse());
    const [a, b] = [epsilonOf(forth), epsilonOf(back)];
    // rounding only
    for (const [i, value] of a.entries()) expect(value).toBeCloseTo(b[i]!, 6);
    expect(forth.relativeScaleUncertainty).toBeCloseTo(back.relativeScaleUncertainty, 12);
  });

  it('a single solution stays as it is', () => {
    const [only] = three(normal(72), 0);
    const standard = combineSolutions([only!]);
    expect(standard.solutions[0]).toBe(only);
    expect(standard.factors).toEqual([1]);
    expect(standard.constantUncertainty).toBe(0);
  });

  it('solutions that share no wavelengths are joined as they are', () => {
    const gauss = normal(73);
    const [left, right] = [usualNm.slice(0, 100), usualNm.slice(120)].map((wavelengthNm, i) =>
      madeSolution(gauss, { standard: `S${i}`, peak: 0.9, wavelengthNm, u: 0.003 }),
    );
    const { factors, offsets } = combineSolutions([left!, right!]);
    expect(factors).toEqual([1, 1]);
    expect(offsets).toEqual([0, 0]);
  });
});
