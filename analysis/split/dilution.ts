import type { SheetAliquot } from '../sheet/schema.ts';
import type { DilutionFactor } from './concentrations.ts';

export interface ReadDilution extends DilutionFactor {
  /** What is left open, in words; null if all is said. */
  readonly notGiven: string | null;
  readonly note: string | null;
}

/** From the flask to the cuvette: the factor as typed, or the product of the steps. */
export function dilutionOf({ id, dilution }: SheetAliquot): ReadDilution {
  if (!dilution) {
    return {
      factor: 1,
      relativeStandardUncertainty: 0,
      notGiven: null,
      note: `No dilution is given for ${id}: the flask is taken to hold what the cuvette holds.`,
    };
  }
  const steps = dilution.steps ?? [];
  const factor =
    dilution.factor ?? steps.reduce((product, { takeMl, toMl }) => product * (toMl / takeMl), 1);
  return {
    factor,
    relativeStandardUncertainty: dilution.relativeStandardUncertainty ?? 0,
    notGiven: dilution.relativeStandardUncertainty === undefined ? `the dilution of ${id}` : null,
    note: null,
  };
}
