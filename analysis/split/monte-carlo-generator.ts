/** Pseudo-random numbers for one check: the same seed gives the same numbers on every machine. */
export interface RandomNumbers {
  /** Uniform on [0, 1), 53 bits. */
  readonly uniform: () => number;
  /** Standard normal. */
  readonly normal: () => number;
  /** χ² with `df` > 0 degrees of freedom, not necessarily whole. */
  readonly chiSquare: (df: number) => number;
}

/**
 * xoshiro128** (Blackman and Vigna, ACM Trans. Math. Softw. 47 (2021) 36), its state filled from the
 * seed by the finaliser of splitmix (Steele, Lea and Flood, OOPSLA 2014, in its 32-bit form).
 * Normal numbers by Marsaglia's polar method (SIAM Review 6 (1964) 260), gamma numbers by Marsaglia
 * and Tsang (ACM Trans. Math. Softw. 26 (2000) 363).
 */
export function randomNumbers(seed: number): RandomNumbers {
  const word = xoshiro128(seed);
  const uniform = (): number => ((word() >>> 5) * 0x4000000 + (word() >>> 6)) / 2 ** 53;
  const normal = normalBy(uniform);
  return {
    uniform,
    normal,
    chiSquare: (df) => 2 * gammaBy(df / 2, uniform, normal),
  };
}

function xoshiro128(seed: number): () => number {
  let state = seed | 0;
  const next = (): number => {
    state = (state + 0x9e3779b9) | 0;
    let mixed = Math.imul(state ^ (state >>> 16), 0x21f0aaad);
    mixed = Math.imul(mixed ^ (mixed >>> 15), 0x735a2d97);
    return mixed ^ (mixed >>> 15);
  };
  let [a, b, c, d] = [next(), next(), next(), next()];
  return () => {
    const result = Math.imul(rotated(Math.imul(b, 5), 7), 9) >>> 0;
    const shifted = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= shifted;
    d = rotated(d, 11);
    return result;
  };
}

function rotated(word: number, by: number): number {
  return (word << by) | (word >>> (32 - by));
}

function normalBy(uniform: () => number): () => number {
  let spare: number | null = null;
  return () => {
    if (spare !== null) {
      const kept = spare;
      spare = null;
      return kept;
    }
    for (;;) {
      const [x, y] = [2 * uniform() - 1, 2 * uniform() - 1];
      const square = x * x + y * y;
      if (square >= 1 || square === 0) continue;
      const stretch = Math.sqrt((-2 * Math.log(square)) / square);
      spare = y * stretch;
      return x * stretch;
    }
  };
}

/** Gamma of this shape and unit scale; a shape below 1 is boosted by a power of a uniform number. */
function gammaBy(shape: number, uniform: () => number, normal: () => number): number {
  if (shape < 1) return gammaBy(shape + 1, uniform, normal) * (1 - uniform()) ** (1 / shape);
  const d = shape - 1 / 3;
  const c = 1 / Math.sqrt(9 * d);
  for (;;) {
    const x = normal();
    const v = (1 + c * x) ** 3;
    if (v > 0 && Math.log(1 - uniform()) < x * x * 0.5 + d - d * v + d * Math.log(v)) return d * v;
  }
}
