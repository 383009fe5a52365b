import { nonNegativeLeastSquares } from './non-negative.ts';

/** One aliquot on the common points. Arrays have one entry a point. */
export interface MixtureData {
  /** Absorbance. */
  readonly measured: Float64Array;
  /** Expected standard deviation. */
  readonly sd: Float64Array;
  /** Known spectra, absorbance per mol/L. */
  readonly known: readonly Float64Array[];
  readonly baseline: readonly Float64Array[];
}

export interface MissingSpectrum {
  /** 1 at its largest; the scale is not to be known. */
  readonly shape: Float64Array;
  /** Standard deviation of each point of the shape by noise alone. */
  readonly shapeSd: Float64Array;
  /** Absorbance of the missing species at its largest, one for each aliquot. */
  readonly absorbance: readonly number[];
  /** Non-negative amounts of the known species beside it, mol/L, one row for each aliquot. */
  readonly amounts: readonly Float64Array[];
  readonly rounds: number;
  /** Mean square of what is left, in units of the noise. */
  readonly leftOver: number;
}

const mostRounds = 500;
/** Relative change of the sum of squares that ends the search. */
const settled = 1e-8;

/**
 * Spectrum of one missing species from several mixtures, by alternating least squares with
 * non-negativity (R. Tauler, Chemom. Intell. Lab. Syst. 30 (1995) 133; amounts by Lawson and Hanson): the
 * known spectra are held, amounts and the missing spectrum are found in turns until the sum of squares
 * stands. Any part of a known spectrum may be added to the missing one and taken from the known
 * amounts without a trace in the data (rotational ambiguity); from a start that shares nothing with
 * them, the answer is the one that shares least, so the known amounts are the largest that the spectra allow.
 *
 * @param start a guess of the shape: where the residual stands out
 */
export function missingSpectrum(
  mixtures: readonly MixtureData[],
  start: Float64Array,
): MissingSpectrum {
  let shape = scaledToOne(start);
  let before = Number.POSITIVE_INFINITY;
  for (let rounds = 1; ; rounds++) {
    const solved = mixtures.map((mixture) => amountsWith(mixture, shape));
    const squares = solved.reduce((sum, { squares: own }) => sum + own, 0);
    if (rounds >= mostRounds || before - squares <= settled * squares) {
      const points = mixtures.length * shape.length;
      return {
        shape,
        shapeSd: shapeSds(mixtures, solved),
        absorbance: solved.map(({ ofMissing }) => ofMissing),
        amounts: solved.map(({ amounts }) => amounts),
        rounds,
        leftOver: squares / points,
      };
    }
    before = squares;
    shape = scaledToOne(shapeFrom(mixtures, solved, shape));
  }
}

interface Solved {
  readonly amounts: Float64Array;
  readonly ofMissing: number;
  /** Absorbance less all that is known. */
  readonly rest: Float64Array;
  /** Σ (residual / sd)². */
  readonly squares: number;
}

function amountsWith({ measured, sd, known, baseline }: MixtureData, shape: Float64Array): Solved {
  const whitened = (column: Float64Array): Float64Array => column.map((value, i) => value / sd[i]!);
  const columns = [...known, shape, ...baseline];
  const { x } = nonNegativeLeastSquares(
    columns.map(whitened),
    whitened(measured),
    columns.map((_, k) => k > known.length),
  );
  const ofMissing = x[known.length] ?? 0;
  const rest = measured.slice();
  for (const [k, column] of columns.entries()) {
    if (k === known.length) continue;
    const amount = x[k]!;
    for (let i = 0; i < rest.length; i++) rest[i]! -= amount * column[i]!;
  }
  let squares = 0;
  for (let i = 0; i < rest.length; i++)
    squares += ((rest[i]! - ofMissing * shape[i]!) / sd[i]!) ** 2;
  return { amounts: x.slice(0, known.length), ofMissing, rest, squares };
}

/** Best non-negative shape for the amounts found; the old one where no mixture holds any of it. */
function shapeFrom(
  mixtures: readonly MixtureData[],
  solved: readonly Solved[],
  old: Float64Array,
): Float64Array {
  return old.map((value, i) => {
    let [above, below] = [0, 0];
    for (const [m, { ofMissing, rest }] of solved.entries()) {
      const weight = ofMissing / mixtures[m]!.sd[i]! ** 2;
      above += weight * rest[i]!;
      below += weight * ofMissing;
    }
    return below > 0 ? Math.max(above / below, 0) : value;
  });
}

function shapeSds(mixtures: readonly MixtureData[], solved: readonly Solved[]): Float64Array {
  const points = mixtures[0]?.measured.length ?? 0;
  return Float64Array.from({ length: points }, (_, i) => {
    let information = 0;
    for (const [m, { ofMissing }] of solved.entries()) {
      information += (ofMissing / mixtures[m]!.sd[i]!) ** 2;
    }
    return 1 / Math.sqrt(information);
  });
}

function scaledToOne(shape: Float64Array): Float64Array {
  const largest = shape.reduce((most, value) => Math.max(most, value), 0);
  return largest > 0 ? shape.map((value) => value / largest) : shape;
}
