import { expect, test } from 'vitest';
import { armIntoCore, coreFedIntoArm } from '../../../sample-data/kinetics.ts';

/**
 * Stored values of `reference-values/consecutive-kinetics.json`: closed form to 40 digits (mpmath),
 * semi-batch runs by scipy DOP853 against Radau. There the arm is B and the core A.
 */
test.each([
  // κ, arms taken per core; core left, mono, bis
  [0.1, 1, 0.11666595965356646, 0.7666680806928671, 0.11666595965356646],
  [0.2, 1, 0.16748289372858097, 0.6650342125428381, 0.16748289372858097],
  [0.5, 1, 0.25, 0.5, 0.25],
])('arm into core at κ = %f meets the stored closed form', (kappa, taken, core, mono, bis) => {
  const found = armIntoCore(kappa, taken);
  // Halving ends at the last bit of x; the difference x^κ - x costs a digit or two of the sixteen.
  expect(found.core).toBeCloseTo(core, 13);
  expect(found.mono).toBeCloseTo(mono, 13);
  expect(found.bis).toBeCloseTo(bis, 13);
});

test.each([
  // κ; core, mono, bis, arm at the end of the addition, per core charged
  [0.1, 0.3618481160810433, 0.5480863589329313, 0.09006552498602538, 0.27178259109501757],
  [0.5, 0.42116774062934426, 0.3268512831561171, 0.25198097621453863, 0.16918676441480562],
])('core into arm at κ = %f meets the stored semi-batch run', (kappa, core, mono, bis, arm) => {
  // Stored for k₁ · (core charged / volume at the start) · time = 10 and a volume that doubles:
  // the same number is 5 for the final volume, which is what the scenario refers to.
  const run = {
    kappa,
    equivalents: 1,
    k1ConcentrationTime: 5,
    startVolumeShare: 0.5,
    hold: 0,
  };
  const found = coreFedIntoArm(run, 0);
  // 3000 steps of a fourth-order method: h⁴ · (rate 10)⁵ is about 1e-9 at the worst.
  expect(found.core).toBeCloseTo(core, 9);
  expect(found.mono).toBeCloseTo(mono, 9);
  expect(found.bis).toBeCloseTo(bis, 9);
  expect(found.arm).toBeCloseTo(arm, 9);
});
