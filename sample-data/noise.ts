/**
 * Seeded random numbers with a documented algorithm, so that the same seed gives the same bytes
 * everywhere: xoshiro128** (Blackman and Vigna, 2018) filled by a Weyl sequence through the
 * 32-bit finalizer of MurmurHash3; normal deviates by Marsaglia's polar method (1964).
 */

/** Draws one standard normal deviate. */
export type NormalSource = () => number;

/**
 * A stream of its own for each label, so that a file added to the scenario leaves the draws of all
 * others as they are.
 *
 * @param seed a whole number from 0 to 2³² - 1.
 */
export function normalSource(seed: number, label: string): NormalSource {
  const uniform = uniformSource(seed, label);
  let kept: number | undefined;
  return () => {
    if (kept !== undefined) {
      const deviate = kept;
      kept = undefined;
      return deviate;
    }
    for (;;) {
      const x = 2 * uniform() - 1;
      const y = 2 * uniform() - 1;
      const square = x * x + y * y;
      if (square >= 1 || square === 0) continue;
      const stretch = Math.sqrt((-2 * Math.log(square)) / square);
      kept = y * stretch;
      return x * stretch;
    }
  };
}

/** σ_A² = constant² + (transmittance · 10^A)²: photometric noise of a single reading. */
export interface PhotometricNoise {
  readonly constant: number;
  readonly transmittance: number;
}

/** Standard deviation of one reading of the given true absorbance. */
export function noiseDeviation(noise: PhotometricNoise, absorbance: number): number {
  return Math.hypot(noise.constant, noise.transmittance * 10 ** absorbance);
}

/** xoshiro128**, as numbers between 0 and 1 with both ends left out. */
function uniformSource(seed: number, label: string): () => number {
  if (!Number.isInteger(seed) || seed < 0 || seed > 0xffffffff) {
    throw new RangeError('the seed must be a whole number from 0 to 4294967295');
  }
  let weyl = (finalize(seed + 0x9e3779b9) ^ hashOf(label)) >>> 0;
  const next = (): number => {
    weyl = (weyl + 0x9e3779b9) >>> 0;
    return finalize(weyl);
  };
  let a = next();
  let b = next();
  let c = next();
  let d = next();
  return () => {
    const result = Math.imul(rotate(Math.imul(b, 5), 7), 9) >>> 0;
    const shifted = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= shifted;
    d = rotate(d, 11);
    return (result + 0.5) / 2 ** 32;
  };
}

function rotate(word: number, by: number): number {
  return (word << by) | (word >>> (32 - by));
}

/** The 32-bit finalizer of MurmurHash3 (Appleby). */
function finalize(word: number): number {
  let h = word >>> 0;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return (h ^ (h >>> 16)) >>> 0;
}

/** FNV-1a, 32 bits, over the code units of a label. */
function hashOf(label: string): number {
  let hash = 0x811c9dc5;
  for (let i = 0; i < label.length; i++) {
    hash = Math.imul(hash ^ label.charCodeAt(i), 0x01000193);
  }
  return hash >>> 0;
}
