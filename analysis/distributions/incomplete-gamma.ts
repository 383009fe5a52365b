import { logGamma } from './log-gamma.ts';

const mostTerms = 100_000;
const tiny = 1e-300;

/** Regularised incomplete gamma functions: P(a, x) below and Q(a, x) above, each without cancellation. */
export function incompleteGamma(
  a: number,
  x: number,
): { readonly lower: number; readonly upper: number } {
  if (!(a > 0 && x >= 0)) throw new RangeError(`incompleteGamma(${a}, ${x})`);
  if (x === 0) return { lower: 0, upper: 1 };
  const front = Math.exp(a * Math.log(x) - x - logGamma(a));
  if (x < a + 1) {
    const lower = front * series(a, x);
    return { lower, upper: 1 - lower };
  }
  const upper = front * fraction(a, x);
  return { lower: 1 - upper, upper };
}

function series(a: number, x: number): number {
  let term = 1 / a;
  let sum = term;
  for (let n = 1; n < mostTerms; n++) {
    term *= x / (a + n);
    sum += term;
    if (term < 1e-17 * sum) break;
  }
  return sum;
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
    if (Math.abs(change - 1) < 1e-16) break;
  }
  return result;
}
