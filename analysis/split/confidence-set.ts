import { normalQuantile } from '../distributions/normal.ts';
import { studentTQuantile } from '../distributions/student-t.ts';
import { acceptance } from './bounded-mean.ts';

export const confidence = 0.95;
/** 97.5 % quantile of the normal. */
export const plainQuantile = normalQuantile((1 + confidence) / 2);

/** A parameter that is bounded below by 0 and, it may be, above, and the test of a supposed value. */
export interface BoundedParameter {
  /** Departure of the data from the supposed value, in standard deviations: z(value). */
  readonly departure: (value: number) => number;
  /** Standard deviation of the estimate if the value were the supposed one. */
  readonly sd: (value: number) => number;
  /** Unconstrained estimate. */
  readonly estimate: number;
  /** Infinity for none. */
  readonly upper: number;
  /** Degrees of freedom behind the standard deviation; Infinity where it is known. */
  readonly df: number;
}

/**
 * 95 % interval of a bounded parameter by inverting its test: Student's away from the bounds (for
 * a ratio this is Fieller's interval), Feldman and Cousins' near them. Never empty, never outside
 * the bounds.
 */
export function confidenceInterval(parameter: BoundedParameter): readonly [number, number] {
  const { estimate, upper, sd } = parameter;
  const start = Math.min(Math.max(estimate, 0), upper);
  const step = sd(start);
  if (!(step > 0)) return [start, start];
  return [end(parameter, start, -step), end(parameter, start, step)];
}

function end(parameter: BoundedParameter, start: number, step: number): number {
  const bound = step < 0 ? 0 : parameter.upper;
  let inside = start;
  let outside: number | null = null;
  for (let k = 1; k <= 400 && outside === null; k++) {
    const reach = start + step * k * 0.5 * 1.05 ** k;
    const next = step < 0 ? Math.max(reach, bound) : Math.min(reach, bound);
    if (accepted(parameter, next)) inside = next;
    else outside = next;
    if (next === bound) break;
  }
  return outside === null ? inside : edge(parameter, inside, outside);
}

function edge(parameter: BoundedParameter, accepts: number, refuses: number): number {
  let inside = accepts;
  let outside = refuses;
  for (let k = 0; k < 60; k++) {
    const middle = (inside + outside) / 2;
    if (accepted(parameter, middle)) inside = middle;
    else outside = middle;
  }
  return inside;
}

function accepted({ departure, sd, upper, df }: BoundedParameter, value: number): boolean {
  const widening = df === Number.POSITIVE_INFINITY ? 1 : studentFactor(df);
  const z = departure(value) / widening;
  const unit = sd(value) * widening;
  const mean = value / unit;
  const room = upper === Number.POSITIVE_INFINITY ? upper : (upper - value) / unit;
  // a bound outside the two-sided region does not show in it
  if (mean >= plainQuantile && room >= plainQuantile) return Math.abs(z) <= plainQuantile;
  const [low, high] = acceptance(mean, mean + room, confidence);
  return z >= low && z <= high;
}

const studentFactors = new Map<number, number>();

/** Student's 97.5 % quantile over the normal one. */
export function studentFactor(df: number): number {
  const known = studentFactors.get(df);
  if (known !== undefined) return known;
  const factor = studentTQuantile((1 + confidence) / 2, df) / plainQuantile;
  studentFactors.set(df, factor);
  return factor;
}
