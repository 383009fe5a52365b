import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type NonlinearProblem,
  nonlinearLeastSquares,
} from '../../../analysis/unmixing/nonlinear-least-squares.ts';
import { factorise } from '../../../analysis/unmixing/orthogonal.ts';

/** Counts how often the model is asked. */
function counted(problem: NonlinearProblem): { problem: NonlinearProblem; calls: () => number } {
  let calls = 0;
  return {
    calls: () => calls,
    problem: {
      ...problem,
      residual: (parameters) => {
        calls += 1;
        return problem.residual(parameters);
      },
    },
  };
}

const x = Float64Array.from({ length: 41 }, (_, i) => 400 + i);
const band = (centre: number, height: number) =>
  x.map((nm) => height * Math.exp(-(((nm - centre) / 12) ** 2) / 2));

/** A band that moved: parameters are its centre and height; noise is any fixed pattern. */
function movedBand(measured: Float64Array, allowed = Number.POSITIVE_INFINITY): NonlinearProblem {
  return {
    residual: ([centre = 0, height = 0]) =>
      Math.abs(centre - 420) > allowed
        ? x.map(() => Number.NaN)
        : band(centre, height).map((value, i) => value - (measured[i] ?? 0)),
    jacobian: ([centre = 0, height = 0]) => {
      const shape = band(centre, 1);
      return [shape.map((value, i) => (height * value * ((x[i] ?? 0) - centre)) / 144), shape];
    },
  };
}

const ripple = x.map((_, i) => 1e-3 * Math.sin(7 * i));

describe('nonlinear least squares', () => {
  it('finds a moved band, with residual and Jacobian orthogonal, in a dozen evaluations', () => {
    const measured = band(420.3, 0.8).map((value, i) => value + (ripple[i] ?? 0));
    const { problem, calls } = counted(movedBand(measured));
    const fit = nonlinearLeastSquares(Float64Array.of(420, 1), problem);
    expect(fit.converged).toBe(true);
    // the ripple of 1e-3 moves the answer by a few of its standard deviations of 1e-2 nm and 3e-4
    expect(fit.parameters[0]).toBeCloseTo(420.3, 1);
    expect(fit.parameters[1]).toBeCloseTo(0.8, 2);
    expect(fit.orthogonality).toBeLessThan(1e-10);
    // six of the library's, the rest ours; ten searches would be over a hundred
    expect(calls()).toBeLessThan(20);
  });

  it('agrees with the linear solution where the model is linear, from anywhere', () => {
    const columns = [x.map(() => 1), x.map((nm) => (nm - 420) / 20)];
    const linear = factorise(columns).solve(ripple);
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -1e3, max: 1e3, noNaN: true }), { minLength: 2, maxLength: 2 }),
        (start) => {
          const fit = nonlinearLeastSquares(Float64Array.from(start), {
            residual: ([a = 0, b = 0]) =>
              ripple.map((value, i) => a + b * (columns[1]?.[i] ?? 0) - value),
            jacobian: () => columns,
          });
          expect(fit.converged).toBe(true);
          // the residual is 1e-3: rounding of a and b beside it leaves some thirteen digits of it
          for (const [k, value] of fit.parameters.entries()) {
            expect(Math.abs(value - (linear[k] ?? Number.NaN))).toBeLessThan(1e-14);
          }
        },
      ),
    );
  });

  it('keeps to where the model has a value', () => {
    const measured = band(420.3, 0.8);
    const inside = nonlinearLeastSquares(Float64Array.of(419.2, 1), movedBand(measured, 1));
    expect(inside.converged).toBe(true);
    expect(inside.parameters[0]).toBeCloseTo(420.3, 9);
    // the minimum is beyond the edge: the best inside it, and not called converged
    const atEdge = nonlinearLeastSquares(Float64Array.of(420, 1), movedBand(measured, 0.2), {
      searches: 1,
    });
    expect(atEdge.converged).toBe(false);
    expect(atEdge.parameters[0]).toBeLessThanOrEqual(420.2);
    expect(atEdge.parameters[0]).toBeGreaterThan(420);
    expect(() => nonlinearLeastSquares(Float64Array.of(430, 1), movedBand(measured, 1))).toThrow(
      RangeError,
    );
  });

  it('does not call converged what has no minimum, or none of its own', () => {
    // exp(-b) falls for ever
    const falling = nonlinearLeastSquares(Float64Array.of(0), {
      residual: ([b = 0]) => Float64Array.of(Math.exp(-b), Math.exp(-b)),
      jacobian: ([b = 0]) => [Float64Array.of(-Math.exp(-b), -Math.exp(-b))],
    });
    expect(falling.converged).toBe(false);
    // only the sum of the two shows
    const ones = x.map(() => 1);
    const twins = nonlinearLeastSquares(Float64Array.of(1, 1), {
      residual: ([a = 0, b = 0]) => ripple.map((value) => a + b - value),
      jacobian: () => [ones, ones],
    });
    expect(twins.converged).toBe(false);
  });

  it('whitened by hand it gives the weighted mean that the library misses with its weights', () => {
    // ten points at 1 and ten at 3, weighted 1 and 10: (10·1·1 + 10·100·3)/(10·1 + 10·100)
    const y = Float64Array.from({ length: 20 }, (_, i) => (i < 10 ? 1 : 3));
    const weight = y.map((value) => (value === 1 ? 1 : 10));
    const fit = nonlinearLeastSquares(Float64Array.of(1), {
      residual: ([mean = 0]) => y.map((value, i) => (mean - value) * (weight[i] ?? 0)),
      jacobian: () => [weight],
    });
    expect(fit.parameters[0]).toBeCloseTo(3010 / 1010, 13);
  });

  it('an exact fit ends with nothing left, without standard deviations where no point is spare', () => {
    const fit = nonlinearLeastSquares(Float64Array.of(1), {
      residual: ([b = 0]) => Float64Array.of(b * b - 9),
      jacobian: ([b = 0]) => [Float64Array.of(2 * b)],
    });
    expect(fit.parameters[0]).toBeCloseTo(3, 14);
    expect(fit.converged).toBe(true);
    expect(fit.standardDeviations[0]).toBeNaN();
  });
});
