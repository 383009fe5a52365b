import { prepare, productPositions, quantifyAliquot, unmixInput } from './quantify.ts';
import type { Reading } from './reading/reading.ts';
import { Refusal } from './refusal.ts';
import type { FitSettings } from './sheet/defaults.ts';
import type { Sheet } from './sheet/schema.ts';
import { inflationOf } from './spectrum/correlated-noise.ts';
import { redrawnCrude, redrawnStandard, standardsDraw } from './split/monte-carlo-draw.ts';
import { type RandomNumbers, randomNumbers } from './split/monte-carlo-generator.ts';
import { type DrawnDistribution, drawnDistribution } from './split/monte-carlo-interval.ts';
import { type Comparison, compared, verdictText } from './split/monte-carlo-verdict.ts';
import type { AliquotResult, Quantified } from './split/results.ts';
import type { SpeciesStandard } from './standards/species-standard.ts';
import { type UnmixInput, type Unmixing, unmix } from './unmixing/unmix.ts';

export interface RedrawOptions {
  /** How many, 100 or more. */
  readonly draws?: number;
  /** A whole number; the same one gives the same check. */
  readonly seed?: number;
}

/** A quantity of the answer: an amount (mol/L), a share of the products, or a ratio of two. */
export type RedrawnKind = 'cuvette' | 'flask' | 'fraction' | 'ratio';

export interface RedrawnQuantity {
  readonly kind: RedrawnKind;
  readonly species: string;
  /** What a ratio is over; null for the other kinds. */
  readonly to: string | null;
  readonly byFit: Quantified;
  readonly byRedraws: DrawnDistribution;
  readonly comparison: Comparison;
}

export interface RedrawCheck {
  readonly aliquot: string;
  readonly draws: number;
  readonly seed: number;
  readonly quantities: readonly RedrawnQuantity[];
  /** Whether the two ways agree, and what a difference says. */
  readonly verdict: string;
}

export const usualDraws = 2000;
const fewestDraws = 100;
const mostDraws = 100_000;

/**
 * Monte Carlo check of one aliquot (JCGM 101:2008): every error of the inputs is drawn, the spectra
 * so redrawn go through the same combination of standards and the same fit as the recorded ones, and
 * the scatter of the answers stands beside the intervals that the fit gives. Inputs are drawn about
 * what was recorded: noise of the crude (with lack of fit) and of the standards with the correlation
 * found in them, scales of stocks and dilutions, the aliquot's dilution, the prior of a wavelength
 * offset. Weights and noise stay as they were found; offset and stray light are fitted each time if free.
 *
 * Yields the number of draws done, after each; returns the check. Throws a `Refusal` where the
 * aliquot cannot be fitted.
 */
export function* checkByRedraws(
  sheet: Sheet,
  readings: ReadonlyMap<string, Reading>,
  aliquotId: string,
  { draws = usualDraws, seed = 1 }: RedrawOptions = {},
): Generator<number, RedrawCheck> {
  refuseDraws(draws);
  const aliquot = sheet.aliquots?.find(({ id }) => id === aliquotId);
  if (!aliquot) throw noSuchAliquot(aliquotId);
  const prepared = prepare(sheet, readings);
  const { result, estimate } = quantifyAliquot(prepared, aliquot, readings);
  const input = unmixInput(prepared, aliquot, readings);
  const unmixing = unmix(input);
  const rows = quantitiesOf(result, unmixing.species, productPositions(prepared));
  const values = rows.map(() => new Float64Array(draws));
  const random = randomNumbers(seed);
  const { factor, relativeStandardUncertainty } = estimate().dilution;
  for (let draw = 0; draw < draws; draw++) {
    const { drawn } = unmix(redrawnInput(input, unmixing, random));
    const dilution = factor * Math.exp(relativeStandardUncertainty * random.normal());
    for (const [q, { read }] of rows.entries()) values[q]![draw] = read(drawn, dilution);
    yield draw + 1;
  }
  const quantities = rows.map(({ kind, species, to, byFit }, q): RedrawnQuantity => {
    const byRedraws = drawnDistribution(values[q]!);
    const comparison = compared(byFit, byRedraws, kind === 'fraction' ? 1 : Infinity);
    return { kind, species, to, byFit, byRedraws, comparison };
  });
  const named = quantities.map(({ kind, species, to, comparison }) => ({
    name: kind === 'ratio' ? `${species} : ${to}` : `${species}, ${kindWords[kind]}`,
    comparison,
  }));
  return { aliquot: aliquotId, draws, seed, quantities, verdict: verdictText(named, draws) };
}

const kindWords = { cuvette: 'cuvette', flask: 'flask', fraction: 'share', ratio: 'ratio' };

function refuseDraws(draws: number): void {
  if (Number.isInteger(draws) && draws >= fewestDraws && draws <= mostDraws) return;
  throw new Refusal({
    code: 'draws-out-of-range',
    message: `${draws} redraws were asked for.`,
    mend: `Ask for a whole number from ${fewestDraws} to ${mostDraws}.`,
  });
}

function noSuchAliquot(id: string): Refusal {
  return new Refusal({
    code: 'aliquot-missing',
    message: `The sheet has no aliquot "${id}".`,
    mend: 'Choose one of its aliquots.',
  });
}

interface Row extends Pick<RedrawnQuantity, 'kind' | 'species' | 'to' | 'byFit'> {
  /** From the non-negative amounts in the cuvette (mol/L) and the dilution factor. */
  readonly read: (amounts: Float64Array, dilution: number) => number;
}

/** Every quantity of the result, with how a redraw comes to it. */
function quantitiesOf(
  { concentrations, split, ratios }: AliquotResult,
  species: readonly string[],
  products: readonly number[],
): Row[] {
  const at = (id: string): number => species.indexOf(id);
  const amounts = concentrations.flatMap((each): Row[] => {
    const k = at(each.species);
    const row = { species: each.species, to: null };
    return [
      { ...row, kind: 'cuvette', byFit: each.cuvetteMolPerL, read: (c) => c[k]! },
      {
        ...row,
        kind: 'flask',
        byFit: each.flaskMolPerL,
        read: (c, dilution) => dilution * c[k]!,
      },
    ];
  });
  const shares = split.map(({ species: id, fraction }): Row => {
    const k = at(id);
    return {
      kind: 'fraction',
      species: id,
      to: null,
      byFit: fraction,
      read: (c) => c[k]! / products.reduce((sum, l) => sum + c[l]!, 0),
    };
  });
  const pairs = ratios.map(({ of, to, value }): Row => {
    const [k, l] = [at(of), at(to)];
    return { kind: 'ratio', species: of, to, byFit: value, read: (c) => c[k]! / c[l]! };
  });
  return [...shares, ...pairs, ...amounts];
}

/** One drawing of all errors, as an input to the fit: the same points, the noise as it was found. */
function redrawnInput(input: UnmixInput, unmixing: Unmixing, random: RandomNumbers): UnmixInput {
  const { kernel } = unmixing.correlation;
  const draw = standardsDraw(random, unmixing.standards, kernel);
  const noise = {
    level: Math.sqrt(unmixing.standardsLevel),
    inflation: Math.max(1, inflationOf(unmixing.correlation)),
  };
  const { shift, shiftPriorNm } = input.settings;
  const prior = shift === 'common' && shiftPriorNm !== null ? shiftPriorNm * random.normal() : 0;
  const settings: FitSettings = {
    ...input.settings,
    windowNm: null,
    excludeNm: [],
    upperAbsorbance: Number.POSITIVE_INFINITY,
    noise: unmixing.noise,
  };
  const made = new Map<number, readonly SpeciesStandard[]>();
  return {
    ...input,
    crude: redrawnCrude(input.crude, unmixing, random, prior),
    settings,
    standardsAt: (strayLight) => {
      const known = made.get(strayLight);
      if (known) return known;
      const standards = input
        .standardsAt(strayLight)
        .map((standard) => redrawnStandard(standard, draw, noise));
      made.set(strayLight, standards);
      return standards;
    },
  };
}
