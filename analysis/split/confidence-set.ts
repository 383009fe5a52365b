import { normalQuantile } from '../distributions/normal.ts';
import { studentTQuantile } from '../distributions/student-t.ts';
import { isAccepted } from './bounded-mean.ts';
import { fiellerSet, type UncertainRatio } from './fieller.ts';

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
  /** Where the parameter is a ratio of two estimates: Fieller's closed form then serves away from the bounds. */
  readonly ratio?: UncertainRatio;
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
  const closed = closedInterval(parameter);
  if (closed) return closed;
  return [end(parameter, start, -step), end(parameter, start, step)];
}

/** Fieller's interval, if both its ends stand so far from the bounds that no bound shows in their tests. */
function closedInterval(parameter: BoundedParameter): readonly [number, number] | null {
  if (!parameter.ratio) return null;
  const set = fiellerSet(parameter.ratio, plainQuantile * widening(parameter));
  if (set.shape !== 'bounded') return null;
  const { lower, upper } = set;
  const clear = [lower, upper].every((value) => isClear(inStandardDeviations(parameter, value)));
  return clear ? [lower, upper] : null;
}

/** From the lower bound and from the upper one, in standard deviations. */
interface DistancesFromBounds {
  readonly mean: number;
  readonly room: number;
}

function inStandardDeviations(parameter: BoundedParameter, value: number): DistancesFromBounds {
  const { sd, upper } = parameter;
  const unit = sd(value) * widening(parameter);
  return {
    mean: value / unit,
    room: upper === Number.POSITIVE_INFINITY ? upper : (upper - value) / unit,
  };
}

/** A bound outside the two-sided region does not show in it. */
function isClear({ mean, room }: DistancesFromBounds): boolean {
  return mean >= plainQuantile && room >= plainQuantile;
}

/** What a standard deviation counts more for having been estimated. */
function widening({ df }: BoundedParameter): number {
  return df === Number.POSITIVE_INFINITY ? 1 : studentFactor(df);
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

/** The bracket is a standard deviation or so wide: its ends are found to some 1e-13 of it. */
const halvings = 42;

function edge(parameter: BoundedParameter, accepts: number, refuses: number): number {
  let inside = accepts;
  let outside = refuses;
  for (let k = 0; k < halvings; k++) {
    const middle = (inside + outside) / 2;
    if (accepted(parameter, middle)) inside = middle;
    else outside = middle;
  }
  return inside;
}

function accepted(parameter: BoundedParameter, value: number): boolean {
  const z = parameter.departure(value) / widening(parameter);
  const { mean, room } = inStandardDeviations(parameter, value);
  if (isClear({ mean, room })) return Math.abs(z) <= plainQuantile;
  return isAccepted(z, mean, mean + room, confidence);
}

const studentFactors = new Map<number, number>();
const mostFactors = 64;

/** Student's 97.5 % quantile over the normal one. */
export function studentFactor(df: number): number {
  const known = studentFactors.get(df);
  if (known !== undefined) return known;
  const factor = studentTQuantile((1 + confidence) / 2, df) / plainQuantile;
  // a batch has as many as it has spectra, and they are not asked for again
  if (studentFactors.size >= mostFactors) studentFactors.clear();
  studentFactors.set(df, factor);
  return factor;
}
