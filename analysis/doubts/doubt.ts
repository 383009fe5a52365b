/** The closed list of SHEET.md. */
const doubtCodes = [
  'saturated',
  'lookalike-standards',
  'unexplained-band',
  'wavelength-offset',
  'baseline-large',
  'below-detection',
  'negative-amount',
  'window-sensitive',
  'beyond-standards',
  'nonlinear-standard',
  'balance-open',
  'uncertainty-not-given',
] as const;

export type DoubtCode = (typeof doubtCodes)[number];

/** A reason to trust a result less: what was seen, what it may do to the answer, what to do next. */
export interface Doubt {
  readonly code: DoubtCode;
  readonly message: string;
  /** Wavelength ranges [low, high] in nm that cause it: one pair, or several laid end to end. */
  readonly atNm?: readonly number[];
  /** Species it speaks of, by id. */
  readonly species?: readonly string[];
}
