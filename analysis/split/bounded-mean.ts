import { normalCdf } from '../distributions/normal.ts';

/**
 * Acceptance region of Feldman and Cousins (Phys. Rev. D 57 (1998) 3873) for one normal reading of
 * unit standard deviation whose mean is known to lie in [0, upper]: readings are taken in by
 * likelihood ratio against the best allowed mean. Intervals made from it are never empty, and go
 * over by themselves from two-sided to an upper limit.
 *
 * @param mean the mean supposed, in standard deviations, within [0, upper]
 * @param upper the upper bound of the mean, in standard deviations; Infinity for none
 * @param confidence 0.95
 * @returns lowest and highest reading accepted, minus the mean; -Infinity or Infinity where open
 */
export function acceptance(
  mean: number,
  upper: number,
  confidence: number,
): readonly [number, number] {
  let deep = -60;
  let shallow = 0;
  for (let step = 0; step < 80; step++) {
    const level = (deep + shallow) / 2;
    const [low, high] = between(mean, upper, level);
    if (normalCdf(high) - normalCdf(low) > confidence) deep = level;
    else shallow = level;
  }
  return between(mean, upper, (deep + shallow) / 2);
}

/**
 * Whether a reading is in the acceptance region: whether the region that reaches just as far as it
 * holds no more than the confidence. The same test as `acceptance`, without looking for the ends.
 *
 * @param z the reading minus the mean, in standard deviations
 */
export function isAccepted(z: number, mean: number, upper: number, confidence: number): boolean {
  const [low, high] = between(mean, upper, levelOf(z, mean, upper));
  return normalCdf(high) - normalCdf(low) <= confidence;
}

/** Log likelihood ratio of a reading against the best allowed mean. */
function levelOf(z: number, mean: number, upper: number): number {
  const reading = mean + z;
  if (reading < 0) return mean * z + (mean * mean) / 2;
  if (reading <= upper) return (-z * z) / 2;
  const room = upper - mean;
  return -room * z + (room * room) / 2;
}

/** Readings, minus the mean, whose log likelihood ratio is at least `level` (at most 0). */
function between(mean: number, upper: number, level: number): readonly [number, number] {
  const reach = Math.sqrt(-2 * level);
  const room = upper - mean;
  const low = reach <= mean ? -reach : lowBeyondBound(mean, level);
  const high = reach <= room ? reach : -lowBeyondBound(room, level);
  return [low, high];
}

/** Beyond the bound the ratio falls linearly in the reading: x·m - m²/2 = level, x from the bound. */
function lowBeyondBound(distance: number, level: number): number {
  if (distance === 0) return Number.NEGATIVE_INFINITY;
  return (level + (distance * distance) / 2) / distance - distance;
}
