import { dot } from './vectors.ts';

let made: readonly Float64Array[] | null = null;

/** Kernels that instruments smooth with, symmetric, each of unit sum of squares. */
export function smoothers(): readonly Float64Array[] {
  made ??= [...means(), ...parabolas(), ...bells()].map((kernel) => {
    const length = Math.sqrt(dot(kernel, kernel));
    return kernel.map((value) => value / length);
  });
  return made;
}
/** Running means of odd and even width, once and twice. Even ones are taken twice half apart, as [½ 1 … 1 ½]. */
function means(): Float64Array[] {
  const found: Float64Array[] = [];
  for (let half = 1; half <= 15; half++) {
    const odd = new Float64Array(2 * half + 1).fill(1);
    const even = odd.map((value, i) => (i === 0 || i === 2 * half ? 0.5 * value : value));
    const twice = odd.map((_, i) => half + 1 - Math.abs(i - half));
    found.push(odd, even, twice);
  }
  return found;
}

/** Local parabolas (Savitzky and Golay, Anal. Chem. 36 (1964) 1627), 5 to 31 points. */
function parabolas(): Float64Array[] {
  return Array.from({ length: 14 }, (_, index) => {
    const half = index + 2;
    return Float64Array.from(
      { length: 2 * half + 1 },
      (__, i) => 3 * half * (half + 1) - 1 - 5 * (i - half) ** 2,
    );
  });
}

function bells(): Float64Array[] {
  return [0.5, 0.7, 1, 1.4, 2, 2.8, 4, 5.6].map((sd) => {
    const half = Math.ceil(4 * sd);
    return Float64Array.from({ length: 2 * half + 1 }, (_, i) =>
      Math.exp(-0.5 * ((i - half) / sd) ** 2),
    );
  });
}
