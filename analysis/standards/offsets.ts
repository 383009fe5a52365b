/** A solution whose ε is `slope` · (ε of the reference) + `intercept`, as measured. */
export interface AgainstReference {
  readonly slope: number;
  /** L mol⁻¹ cm⁻¹ */
  readonly intercept: number;
  readonly interceptVariance: number;
  /** Absorbance of this solution per unit of its ε: concentration × path. */
  readonly absorbancePerEpsilon: number;
}

export interface Offsets {
  /** Constant of each solution's own, in its ε (L mol⁻¹ cm⁻¹), in their order. */
  readonly epsilon: readonly number[];
  /** Standard uncertainty of the constant that all are left with, in ε of the reference. */
  readonly uncertainty: number;
}

/** What two fillings of one cuvette agree within where nothing is amiss. Absorbance. */
const usualOffset = 2e-4;
const noiseBeside = 3;
const mostRounds = 100;

/**
 * The offsets of the solutions' own. Solutions held against each other fix the differences of their
 * offsets and leave one constant open, which would be in ε itself. It is placed where the offsets in
 * absorbance are together closest to 0 by Cauchy's M-estimate (Huber, Robust Statistics, 1981), the
 * best of its minima: with three or more, one that stands apart by more than a few times the usual does
 * not pull. With two nothing can say which of them is off: least squares. With one, it is 0.
 *
 * The uncertainty is what the offsets scatter (sandwich of the M-estimate, n/(n - 1)).
 */
export function offsetsOf(solutions: readonly AgainstReference[]): Offsets {
  if (solutions.length < 2) return { epsilon: solutions.map(() => 0), uncertainty: 0 };
  const pieces = solutions.map(
    ({ slope, intercept, interceptVariance, absorbancePerEpsilon: perEpsilon }) => ({
      at: perEpsilon * intercept,
      rise: perEpsilon * slope,
      scale: Math.hypot(usualOffset, noiseBeside * perEpsilon * Math.sqrt(interceptVariance)),
    }),
  );
  const constant = solutions.length === 2 ? leastSquares(pieces) : mEstimate(pieces);
  let [top, bottom] = [0, 0];
  for (const piece of pieces) {
    const weight = solutions.length === 2 ? piece.scale ** -2 : weightAt(piece, constant);
    top += (weight * piece.rise * (piece.at + piece.rise * constant)) ** 2;
    bottom += weight * piece.rise ** 2;
  }
  const smallSample = solutions.length / (solutions.length - 1);
  return {
    epsilon: solutions.map(({ slope, intercept }) => intercept + slope * constant),
    uncertainty: Math.sqrt(smallSample * top) / bottom,
  };
}

/** The offset of one solution in absorbance as the open constant moves it: at + rise · constant. */
interface Piece {
  readonly at: number;
  readonly rise: number;
  readonly scale: number;
}

function leastSquares(pieces: readonly Piece[]): number {
  return solved(pieces, ({ scale }) => scale ** -2);
}

function mEstimate(pieces: readonly Piece[]): number {
  const starts = [leastSquares(pieces), ...pieces.map(({ at, rise }) => -at / rise)];
  let best = { constant: 0, cost: Number.POSITIVE_INFINITY };
  for (const start of starts) {
    let constant = start;
    for (let round = 0; round < mostRounds; round++) {
      const next = solved(pieces, (piece) => weightAt(piece, constant));
      const moved = Math.abs(next - constant);
      constant = next;
      if (
        moved <=
        1e-9 * pieces.reduce((least, { scale, rise }) => Math.min(least, scale / rise), Infinity)
      )
        break;
    }
    const cost = pieces.reduce(
      (sum, { at, rise, scale }) => sum + Math.log1p(((at + rise * constant) / scale) ** 2),
      0,
    );
    if (cost < best.cost) best = { constant, cost };
  }
  return best.constant;
}

function weightAt({ at, rise, scale }: Piece, constant: number): number {
  return 1 / (scale ** 2 + (at + rise * constant) ** 2);
}

function solved(pieces: readonly Piece[], weightOf: (piece: Piece) => number): number {
  let [top, bottom] = [0, 0];
  for (const piece of pieces) {
    const weight = weightOf(piece);
    top -= weight * piece.rise * piece.at;
    bottom += weight * piece.rise ** 2;
  }
  return top / bottom;
}
