import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { quadratic } from '../../analysis/spectrum/vectors.ts';
import { fiellerSet } from '../../analysis/split/fieller.ts';
import { ratiosOf } from '../../analysis/split/fractions.ts';
import { pooled } from '../../analysis/split/pooled.ts';
import { factorise } from '../../analysis/unmixing/orthogonal.ts';
import { weightedFit } from '../../analysis/unmixing/weighted-fit.ts';
import { published } from './values.ts';

// GUM H.2, H.3 (JCGM 100:2008) and QUAM A5 (Eurachem/CITAC CG 4, 3rd ed. 2012). Status: data and
// results read in a public copy (documentation and tests of an open uncertainty library), reproduced
// with numpy and mpmath (`computed`); s = 0.005486 and Sxx = 1.2 of A5 from memory.

const ratioExample = v.object({
  id: v.literal('gum-h2-ratio-of-correlated-quantities'),
  V: v.array(v.number()),
  ImA: v.array(v.number()),
  phiRad: v.array(v.number()),
  published: v.record(v.string(), v.number()),
  computed: v.record(v.string(), v.number()),
});
const lineExample = v.object({
  id: v.literal('gum-h3-straight-line-calibration'),
  t: v.array(v.number()),
  b: v.array(v.number()),
  t0: v.number(),
  published: v.record(v.string(), v.number()),
  computed: v.record(v.string(), v.number()),
});
const calibrationExample = v.object({
  id: v.literal('quam-a5-linear-calibration'),
  concentration: v.array(v.number()),
  absorbance: v.array(v.number()),
  sample: v.array(v.number()),
  published: v.record(v.string(), v.number()),
  computed: v.record(v.string(), v.number()),
});
const { examples } = v.parse(
  v.object({ examples: v.array(v.unknown()) }),
  published('uncertainty-worked.json'),
);

type Row = readonly number[];

function example<T>(schema: v.GenericSchema<unknown, T>): T {
  const found = examples.find((entry) => v.is(schema, entry));
  return v.parse(schema, found);
}

/** 1e-11: computed to fifteen digits; means and sums of squares in doubles lose two or three. */
function expectComputed(value: number, computed: number | undefined): void {
  expect(Math.abs(value / (computed ?? Number.NaN) - 1)).toBeLessThan(1e-11);
}

/** Printed figures: one unit of the last digit, as these documents round on their way. */
function expectPrinted(value: number, printed: number | undefined): void {
  const decimals = `${printed}`.split('.')[1]?.length ?? 0;
  expect(Math.abs(value - (printed ?? Number.NaN))).toBeLessThan(10 ** -decimals);
}

/** Least squares with the covariance of its parameters, the scatter taken from the residual. */
function fitted(columns: readonly Float64Array[], y: Row) {
  const factors = factorise(columns);
  const parameters = factors.solve(Float64Array.from(y));
  const inverse = factors.pseudoInverse();
  const rss = y.reduce((sum, value, i) => {
    const at = columns.reduce((so, column, k) => so + (column[i] ?? 0) * (parameters[k] ?? 0), 0);
    return sum + (value - at) ** 2;
  }, 0);
  const variance = rss / (y.length - columns.length);
  const covariance = inverse.map((a) =>
    Float64Array.from(inverse, (b) =>
      a.reduce((sum, value, i) => sum + variance * value * (b[i] ?? 0), 0),
    ),
  );
  return { parameters, covariance, rss };
}

describe('GUM H.2: resistance, reactance and impedance from correlated readings', () => {
  const { V, ImA, phiRad, published: printed, computed } = example(ratioExample);
  const readings = [V, ImA.map((value) => value / 1000), phiRad];
  const n = V.length;
  // as replicates are pooled: nothing of their own is known, all of the variance is what they scatter
  const pooledOf = (row: Row) =>
    pooled(row.map((value) => ({ value, ownVariance: 0, df: n, effects: new Float64Array(0) })));
  const means = Float64Array.from(readings, (row) => pooledOf(row).mean);
  const covariance = readings.map((first, k) =>
    Float64Array.from(readings, (second, l) => {
      // the covariance from the variances of sum and difference
      const [a, b] = [1 / (means[k] ?? 1), 1 / (means[l] ?? 1)];
      const joined = pooledOf(first.map((value, i) => value * a + (second[i] ?? 0) * b));
      const apart = pooledOf(first.map((value, i) => value * a - (second[i] ?? 0) * b));
      return (joined.ownVariance - apart.ownVariance) / (4 * a * b);
    }),
  );
  const [voltage = 0, current = 0, angle = 0] = means;
  const impedance = voltage / current;
  const gradientOf = (value: number, byAngle: number) =>
    Float64Array.of(value / voltage, -value / current, byAngle);
  const resistance = impedance * Math.cos(angle);
  const reactance = impedance * Math.sin(angle);
  const gradients = {
    R: gradientOf(resistance, -reactance),
    X: gradientOf(reactance, resistance),
    Z: gradientOf(impedance, 0),
  };
  const sd = (of: keyof typeof gradients) => Math.sqrt(quadratic(gradients[of], covariance));

  it.each([
    ['R', resistance],
    ['X', reactance],
    ['Z', impedance],
  ] as const)('%s and its standard uncertainty', (name, value) => {
    expectPrinted(value, printed[name]);
    expectComputed(value, computed[name]);
    expectPrinted(sd(name), printed[`u${name}`]);
    // variances are differences of nearly equal readings (1 part in 1,000 scatters): three digits more
    expect(Math.abs(sd(name) / (computed[`u${name}`] ?? 0) - 1)).toBeLessThan(1e-8);
  });

  it.each([
    ['R', 'X'],
    ['R', 'Z'],
    ['X', 'Z'],
  ] as const)('the correlation of %s and %s', (a, b) => {
    const correlation = quadratic(gradients[a], covariance, gradients[b]) / (sd(a) * sd(b));
    expectPrinted(correlation, printed[`r${a}${b}`]);
    expect(Math.abs(correlation - (computed[`r${a}${b}`] ?? 0))).toBeLessThan(1e-8);
  });

  it('the ratio of voltage to current as the program reports a ratio of two amounts', () => {
    const own = covariance.slice(0, 2).map((row) => row.slice(0, 2));
    const [result] = ratiosOf(
      {
        species: ['voltage', 'current'],
        amounts: means.slice(0, 2),
        drawn: means.slice(0, 2),
        own,
        common: own.map((row) => row.map(() => 0)),
        selfScale: new Float64Array(2),
        df: n - 1,
      },
      [0, 1],
    );
    expectPrinted(result?.value.value ?? Number.NaN, printed.Z);
    expectPrinted(result?.value.standardUncertainty ?? Number.NaN, printed.uZ);
    // voltage and current ran against each other (r = -0.36): taken as independent it would be too small
    const apart = own.map((row, k) => row.map((value, l) => (k === l ? value : 0)));
    const independent = Math.sqrt(quadratic(gradients.Z.slice(0, 2), apart));
    expect(independent).toBeLessThan(0.9 * (result?.value.standardUncertainty ?? 0));
  });
});

describe('GUM H.3: the calibration line of a thermometer', () => {
  const { t, b, t0, published: printed, computed } = example(lineExample);
  const { parameters, covariance, rss } = fitted(
    [Float64Array.from(t, () => 1), Float64Array.from(t, (value) => value - t0)],
    b,
  );
  const [y1 = 0, y2 = 0] = parameters;
  const along = (...weights: number[]) =>
    Math.sqrt(quadratic(Float64Array.from(weights), covariance));

  it('has the parameters, their uncertainties and correlation', () => {
    expectPrinted(y1, printed.y1);
    expectComputed(y1, computed.y1);
    expectPrinted(y2, printed.y2);
    expectComputed(y2, computed.y2);
    expectPrinted(along(1, 0), printed.u1);
    expectComputed(along(1, 0), computed.u1);
    expectPrinted(along(0, 1), printed.u2);
    expectComputed(along(0, 1), computed.u2);
    const correlation = (covariance[0]?.[1] ?? 0) / (along(1, 0) * along(0, 1));
    expectPrinted(correlation, printed.r);
    expectComputed(correlation, computed.r);
    expectComputed(rss, computed.rss);
  });

  it('gives the correction at 30 °C, outside the range of the readings', () => {
    expectPrinted(y1 + 10 * y2, printed.b30);
    expectComputed(y1 + 10 * y2, computed.b30);
    expectPrinted(along(1, 10), printed.u30);
    expectComputed(along(1, 10), computed.u30);
  });
});

describe('QUAM A5: cadmium read from a calibration line', () => {
  const {
    concentration,
    absorbance,
    sample,
    published: printed,
    computed,
  } = example(calibrationExample);
  // any constant noise gives equal weights; the scatter about the line then says how large it is
  const assumed = 1e-3;
  const fit = weightedFit(
    [Float64Array.from(concentration, () => 1), Float64Array.from(concentration)],
    Float64Array.from(absorbance),
    { constant: assumed, transmittance: 0 },
    () => new Float64Array(concentration.length),
  );
  const scatter = fit.reducedChiSquare * assumed ** 2;
  const covariance = fit.gain.map((a) =>
    Float64Array.from(fit.gain, (b) =>
      a.reduce((sum, value, i) => sum + scatter * value * (b[i] ?? 0), 0),
    ),
  );
  const [intercept = 0, slope = 0] = fit.parameters;
  const read = sample.reduce((sum, value) => sum + value, 0) / sample.length;
  const found = (read - intercept) / slope;

  it('has the line with its uncertainties', () => {
    expectPrinted(intercept, printed.B0);
    expectComputed(intercept, computed.B0);
    expectPrinted(slope, printed.B1);
    expectComputed(slope, computed.B1);
    const [u0, u1] = covariance.map((row, k) => Math.sqrt(row[k] ?? Number.NaN));
    expectPrinted(u0 ?? 0, printed.uB0);
    expectComputed(u0 ?? 0, computed.uB0);
    expectPrinted(u1 ?? 0, printed.uB1);
    expectComputed(u1 ?? 0, computed.uB1);
    expectPrinted(Math.sqrt(scatter), printed.s);
    expectComputed(Math.sqrt(scatter), computed.s);
    const correlation = (covariance[0]?.[1] ?? 0) / ((u0 ?? 0) * (u1 ?? 0));
    expectPrinted(correlation, printed.correlation);
    expectComputed(correlation, computed.correlation);
  });

  it('gives the concentration of the sample and its standard uncertainty', () => {
    expectPrinted(found, printed.c0);
    expectComputed(found, computed.c0);
    // (reading, intercept, slope): the mean of two readings scatters as the line's points do
    const joint = [
      Float64Array.of(scatter / sample.length, 0, 0),
      ...covariance.map((row) => Float64Array.of(0, ...row)),
    ];
    const gradient = Float64Array.of(1 / slope, -1 / slope, -found / slope);
    const uncertainty = Math.sqrt(quadratic(gradient, joint));
    expectPrinted(uncertainty, printed.uc0);
    expectComputed(uncertainty, computed.uc0);
    // the slope is known to 2 %: Fieller's set is that interval, drawn aside by some parts in a thousand
    const numerator = Float64Array.of(1, -1, 0);
    const denominator = Float64Array.of(0, 0, 1);
    const set = fiellerSet(
      {
        numerator: read - intercept,
        denominator: slope,
        numeratorVariance: quadratic(numerator, joint),
        denominatorVariance: quadratic(denominator, joint),
        covariance: quadratic(numerator, joint, denominator),
      },
      1,
    );
    if (set.shape === 'everything') throw new Error('the slope is known');
    expect(Math.abs((set.upper - set.lower) / (2 * uncertainty) - 1)).toBeLessThan(2e-3);
  });
});
