import { prepare, productPositions, unmixInput } from './quantify.ts';
import type { Reading } from './reading/reading.ts';
import { Refusal } from './refusal.ts';
import type { Sheet, SheetAliquot } from './sheet/schema.ts';
import { taken } from './spectrum/vectors.ts';
import { bandColumn } from './unmixing/band-scan.ts';
import { type MixtureData, missingSpectrum } from './unmixing/missing-spectrum.ts';
import { type UnmixInput, type Unmixing, unmix } from './unmixing/unmix.ts';

/** An estimate of what absorbs without a standard. Never a standard: its scale is not known. */
export interface MissingEstimate {
  readonly wavelengthNm: Float64Array;
  /** 1 at its largest, with the standard deviation of each point by noise. */
  readonly shape: Float64Array;
  readonly shapeSd: Float64Array;
  /** The product whose share is given below. */
  readonly species: string | null;
  readonly aliquots: readonly {
    readonly aliquot: string;
    /** Absorbance of the missing species at its largest. */
    readonly absorbance: number;
    /** Share of the first product without and with the missing spectrum; null where there is no split. */
    readonly without: number | null;
    readonly fraction: number | null;
  }[];
  /** Aliquots that could not be used, and why. */
  readonly leftOut: readonly { readonly aliquot: string; readonly why: string }[];
  readonly rounds: number;
}

interface Doubted {
  readonly aliquot: SheetAliquot;
  readonly input: UnmixInput;
  readonly unmixing: Unmixing;
}

const fewestAliquots = 2;
const fewestPoints = 20;

/**
 * The spectrum of a species without a standard, from all aliquots whose residual holds a band, by
 * alternating least squares with non-negativity (`missing-spectrum.ts`). Throws a `Refusal` where fewer
 * than two aliquots show one, or they have no points in common.
 */
export function estimateMissing(
  sheet: Sheet,
  readings: ReadonlyMap<string, Reading>,
): MissingEstimate {
  const prepared = prepare(sheet, readings);
  const leftOut: { aliquot: string; why: string }[] = [];
  const doubted: Doubted[] = [];
  for (const aliquot of sheet.aliquots ?? []) {
    try {
      const input = unmixInput(prepared, aliquot, readings);
      const unmixing = unmix(input);
      const { band } = unmixing;
      if (band && band.height > 0 && band.size > band.limit) {
        doubted.push({ aliquot, input, unmixing });
      }
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      leftOut.push({ aliquot: aliquot.id, why: error.message });
    }
  }
  const used = onOneGrid(doubted, leftOut);
  const strongest = used.reduce<Doubted | null>(
    (best, next) => (sizeOf(next) > (best ? sizeOf(best) : 0) ? next : best),
    null,
  );
  if (!strongest || used.length < fewestAliquots) throw tooFew(used.length);
  const common = commonPoints(used);
  if (common.length < fewestPoints) throw noCommonPoints();
  const nm = taken(strongest.input.crude.wavelengthNm, common);
  const ones = new Float64Array(nm.length).fill(1);
  const band = strongest.unmixing.band;
  if (!band) throw tooFew(0);
  const found = missingSpectrum(
    used.map((each) => mixtureOf(each, common)),
    bandColumn({ nm, sd: ones }, band),
  );
  const products = productPositions(prepared);
  return {
    wavelengthNm: nm,
    shape: found.shape,
    shapeSd: found.shapeSd,
    species: products.length > 1 ? (strongest.unmixing.species[products[0] ?? 0] ?? null) : null,
    aliquots: used.map(({ aliquot, unmixing }, m) => ({
      aliquot: aliquot.id,
      absorbance: found.absorbance[m] ?? 0,
      without: shareOf(unmixing.drawn, products),
      fraction: shareOf(found.amounts[m] ?? new Float64Array(), products),
    })),
    leftOut,
    rounds: found.rounds,
  };
}

function sizeOf({ unmixing: { band } }: Doubted): number {
  return band?.size ?? 0;
}

/** Those on the grid of most strength; the others are told. */
function onOneGrid(
  doubted: readonly Doubted[],
  leftOut: { aliquot: string; why: string }[],
): Doubted[] {
  const [first] = [...doubted].sort((a, b) => sizeOf(b) - sizeOf(a));
  if (!first) return [];
  const grid = first.input.crude.wavelengthNm;
  return doubted.filter(({ aliquot, input }) => {
    const { wavelengthNm } = input.crude;
    const isSame =
      wavelengthNm.length === grid.length &&
      wavelengthNm.every((nm, i) => Math.abs(nm - (grid[i] ?? 0)) <= 1e-6 * nm);
    if (!isSame) leftOut.push({ aliquot: aliquot.id, why: 'It is recorded on other wavelengths.' });
    return isSame;
  });
}

/** Positions of the crude's grid that are fitted in every one. */
function commonPoints(used: readonly Doubted[]): Int32Array {
  const sets = used.map(({ unmixing }) => new Set(unmixing.at));
  return (used[0]?.unmixing.at ?? new Int32Array()).filter((i) => sets.every((set) => set.has(i)));
}

function mixtureOf({ unmixing }: Doubted, common: Int32Array): MixtureData {
  const { at, fit, measured, species, baseline } = unmixing;
  const place = new Map(Array.from(at, (i, j) => [i, j] as const));
  const places = common.map((i) => place.get(i) ?? 0);
  const sd = taken(fit.variance, places).map(Math.sqrt);
  const columns = fit.whitened
    .slice(0, species.length + baseline.length)
    .map((column) => taken(column, places).map((value, i) => value * (sd[i] ?? 1)));
  return {
    measured: taken(measured, places),
    sd,
    known: columns.slice(0, species.length),
    baseline: columns.slice(species.length),
  };
}

function shareOf(amounts: Float64Array, products: readonly number[]): number | null {
  const sum = products.reduce((total, k) => total + (amounts[k] ?? 0), 0);
  const [first] = products;
  return first === undefined || products.length < 2 || !(sum > 0)
    ? null
    : (amounts[first] ?? 0) / sum;
}

function tooFew(found: number): Refusal {
  return new Refusal({
    code: 'too-few-aliquots',
    message: `${found === 0 ? 'No aliquot holds' : 'Only one aliquot holds'} a band that the standards do not explain; at least ${fewestAliquots} on the same wavelengths are needed.`,
    mend: 'Record aliquots at other times or of other runs, in which the unknown stands in other proportions.',
  });
}

function noCommonPoints(): Refusal {
  return new Refusal({
    code: 'no-common-points',
    message: `The aliquots have fewer than ${fewestPoints} fitted points in common.`,
    mend: 'Widen the window, or exclude less.',
  });
}
