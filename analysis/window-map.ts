import { prepare, productPositions, unmixInput } from './quantify.ts';
import type { Reading } from './reading/reading.ts';
import { Refusal } from './refusal.ts';
import type { Sheet } from './sheet/schema.ts';
import { plainQuantile, studentFactor } from './split/confidence-set.ts';
import { fractionGradient } from './unmixing/fraction-gradient.ts';
import { narrowedFits } from './unmixing/narrowed-windows.ts';
import { unmix } from './unmixing/unmix.ts';

/** One narrowed window and what it says. */
export interface WindowMapCell {
  readonly windowNm: readonly [number, number];
  readonly points: number;
  /** Share of the first product; of the whole window for the first cell. */
  readonly fraction: number;
  /** Standard deviation that its departure from the whole window's share would have by noise. */
  readonly departureSd: number;
  /** False where it departs by more than noise explains (two-sided, 5 % in each cell). */
  readonly agrees: boolean;
}

export interface WindowMap {
  readonly aliquot: string;
  /** The product whose share is shown. */
  readonly species: string;
  /** Rows by how much is left out above (none first), cells of a row by how much below; null where too little is left. */
  readonly rows: readonly (readonly (WindowMapCell | null)[])[];
}

/** Shares of the points left out at an end. */
const steps = [0, 0.1, 0.2, 0.3, 0.4] as const;

/**
 * Where the answer holds: the share of the first product of one aliquot in windows narrowed from below and
 * from above. Throws a `Refusal` where the aliquot cannot be fitted or has no split.
 */
export function windowMap(
  sheet: Sheet,
  readings: ReadonlyMap<string, Reading>,
  aliquotId: string,
): WindowMap {
  const prepared = prepare(sheet, readings);
  const aliquot = sheet.aliquots?.find(({ id }) => id === aliquotId);
  const products = productPositions(prepared);
  const [first] = products;
  if (!aliquot || first === undefined || products.length < 2) throw nothingToMap(aliquotId);
  const input = unmixInput(prepared, aliquot, readings);
  const unmixing = unmix(input);
  const sum = products.reduce((total, k) => total + (unmixing.amounts[k] ?? 0), 0);
  if (!(sum > 0)) throw nothingToMap(aliquotId);
  const gradient = fractionGradient(unmixing.amounts, first, products);
  const whole = (unmixing.amounts[first] ?? 0) / sum;
  const quantile = plainQuantile * studentFactor(unmixing.df);
  const nmAt = (point: number): number => input.crude.wavelengthNm[unmixing.at[point] ?? 0] ?? 0;
  const cellAt = (below: number, above: number): WindowMapCell | null => {
    const [fit] = narrowedFits(unmixing, gradient, [{ below, above }]);
    if (!fit) return null;
    const { from, to, amounts, change, sd } = fit;
    const total = products.reduce((part, k) => part + (amounts[k] ?? 0), 0);
    return {
      windowNm: [nmAt(from), nmAt(to)],
      points: to - from + 1,
      fraction: total > 0 ? (amounts[first] ?? 0) / total : whole + change,
      departureSd: sd,
      agrees: below + above === 0 || Math.abs(change) <= quantile * sd,
    };
  };
  return {
    aliquot: aliquotId,
    species: unmixing.species[first] ?? '',
    rows: steps.map((above) => steps.map((below) => cellAt(below, above))),
  };
}

function nothingToMap(aliquot: string): Refusal {
  return new Refusal({
    code: 'no-split',
    message: 'There is no split to map: the sheet has fewer than two products, or none was found.',
    where: { what: `aliquot ${aliquot}` },
    mend: 'Give standards of mono and bis.',
  });
}
