import { deviance } from './deviance.ts';
import { stirlingError } from './stirling-error.ts';

/** Some √a terms are needed near x = a; this is enough for a = 1e10. */
const mostTerms = 1_000_000;
const tiny = 1e-300;

/**
 * Regularised incomplete gamma functions: P(a, x) below and Q(a, x) above. Series below x = a + 1,
 * continued fraction (modified Lentz) above, so that the smaller of the two never comes from a
 * difference for a ≥ 1/2.
 */
export function incompleteGamma(
  a: number,
  x: number,
): { readonly lower: number; readonly upper: number } {
  if (!(a > 0 && a < Number.POSITIVE_INFINITY && x >= 0)) {
    throw new RangeError(`incompleteGamma(${a}, ${x})`);
  }
  if (x === 0) return { lower: 0, upper: 1 };
  if (x === Number.POSITIVE_INFINITY) return { lower: 1, upper: 0 };
  const front = density(a, x);
  if (x < a + 1) {
    const lower = front * series(a, x);
    return { lower, upper: 1 - lower };
  }
  const upper = front === 0 ? 0 : front * fraction(a, x);
  return { lower: 1 - upper, upper };
}

/** x^a e^(-x) / Γ(a). */
function density(a: number, x: number): number {
  if (x === Number.POSITIVE_INFINITY) return 0;
  const exponent = a * deviance(x / a, (x - a) / a) + stirlingError(a);
  return Math.sqrt(a / (2 * Math.PI)) * Math.exp(-exponent);
}

function series(a: number, x: number): number {
  let term = 1 / a;
  let sum = term;
  for (let n = 1; n < mostTerms; n++) {
    term *= x / (a + n);
    sum += term;
    if (term < 1e-17 * sum) return sum;
  }
  throw new RangeError(`incompleteGamma(${a}, ${x}) does not settle`);
}

function fraction(a: number, x: number): number {
  let b = x + 1 - a;
  let c = 1 / tiny;
  let d = 1 / b;
  let result = d;
  for (let n = 1; n < mostTerms; n++) {
    const an = -n * (n - a);
    b += 2;
    d = 1 / (Math.abs(an * d + b) < tiny ? tiny : an * d + b);
    c = Math.abs(b + an / c) < tiny ? tiny : b + an / c;
    const change = d * c;
    result *= change;
    if (Math.abs(change - 1) <= Number.EPSILON) return result;
  }
  throw new RangeError(`incompleteGamma(${a}, ${x}) does not settle`);
}
