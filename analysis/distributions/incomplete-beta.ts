import { deviance } from './deviance.ts';
import { stirlingError } from './stirling-error.ts';

/** Some √max(a, b) terms are needed; this is enough for 1e10. */
const mostTerms = 1_000_000;
const tiny = 1e-300;

/**
 * Regularised incomplete beta function I_x(a, b) by its continued fraction (modified Lentz), on the
 * side where it converges fast. `y` is 1 - x, given apart so that it is not lost near x = 1.
 */
export function incompleteBeta(a: number, b: number, x: number, y = 1 - x): number {
  if (!(a > 0 && b > 0 && a + b < Number.POSITIVE_INFINITY && x >= 0 && y >= 0)) {
    throw new RangeError(`incompleteBeta(${a}, ${b}, ${x})`);
  }
  if (x === 0) return 0;
  if (y === 0) return 1;
  const front = density(a, b, x, y);
  return x < (a + 1) / (a + b + 2)
    ? (front * fraction(a, b, x)) / a
    : 1 - (front * fraction(b, a, y)) / b;
}

/** x^a y^b Γ(a + b) / (Γ(a) Γ(b)), around its peak at x = a/(a + b). */
function density(a: number, b: number, x: number, y: number): number {
  const sum = a + b;
  const gap = x * b - y * a;
  const exponent =
    a * deviance((x / a) * sum, gap / a) +
    b * deviance((y / b) * sum, -gap / b) +
    stirlingError(a) +
    stirlingError(b) -
    stirlingError(sum);
  return Math.sqrt(((a / sum) * b) / (2 * Math.PI)) * Math.exp(-exponent);
}

function fraction(a: number, b: number, x: number): number {
  let c = 1;
  let d = guarded(1 - ((a + b) * x) / (a + 1));
  d = 1 / d;
  let result = d;
  for (let m = 1; m < mostTerms; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / guarded(1 + even * d);
    c = guarded(1 + even / c);
    result *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / guarded(1 + odd * d);
    c = guarded(1 + odd / c);
    const change = d * c;
    result *= change;
    if (Math.abs(change - 1) <= Number.EPSILON) return result;
  }
  throw new RangeError(`incompleteBeta(${a}, ${b}, ${x}) does not settle`);
}

function guarded(value: number): number {
  return Math.abs(value) < tiny ? tiny : value;
}
