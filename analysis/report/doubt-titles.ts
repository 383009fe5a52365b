import type { DoubtCode } from '../doubts/doubt.ts';

/** Doubts by name for people, the same on screen and in print. */
export const doubtTitles: Readonly<Record<DoubtCode, string>> = {
  saturated: 'Points left out for too much absorbance',
  'lookalike-standards': 'Standards too alike',
  'unexplained-band': 'A band that nothing here explains',
  'wavelength-offset': 'Wavelengths that disagree',
  'baseline-large': 'A large baseline',
  'below-detection': 'Below detection',
  'negative-amount': 'An amount below zero',
  'window-sensitive': 'An answer that moves with the window',
  'beyond-standards': 'More than the standards show',
  'nonlinear-standard': 'Standards that disagree with each other',
  'balance-open': 'A balance that does not close',
  'uncertainty-not-given': 'Uncertainty not given',
};
