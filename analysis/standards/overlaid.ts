import { interpolated, interpolation } from '../spectrum/interpolate.ts';
import type { Solution } from './solution.ts';
import type { NoisyPoints } from './straight-line.ts';

/** Two solutions on the points of the first that both can use. */
export interface Overlaid extends NoisyPoints {
  /** Positions of the points on the first one's wavelengths. */
  readonly at: Int32Array;
}

/** ε of `onto` (x) and of `solution` (y) where both reach, on the wavelengths of `onto`. */
export function overlaid(onto: Solution, solution: Solution): Overlaid {
  const map = interpolation(solution.wavelengthNm, solution.usable, onto.wavelengthNm);
  const epsilon = interpolated(map, solution.epsilon);
  const sd = interpolated(map, solution.sd);
  const at = Int32Array.from(onto.usable.keys()).filter(
    (i) => map.covered[i] === 1 && onto.usable[i] === 1,
  );
  const taken = (values: Float64Array): Float64Array => Float64Array.from(at, (i) => values[i]!);
  return {
    at,
    x: taken(onto.epsilon),
    y: taken(epsilon),
    sdX: taken(onto.sd),
    sdY: taken(sd),
  };
}

const smallestOfNote = 1e-100;

/** Concentration × path of a solution; a spectrum given as ε counts as one recorded up to an absorbance of 1. */
export function absorbanceScale({ absorbancePerEpsilon, epsilon, usable }: Solution): number {
  if (absorbancePerEpsilon !== null) return absorbancePerEpsilon;
  let largest = 0;
  for (const [i, value] of epsilon.entries()) {
    if (usable[i] === 1 && value > largest) largest = value;
  }
  // of a spectrum that is nothing but rounding no scale is told
  return largest > smallestOfNote ? 1 / largest : 1;
}
