import type { AmountEstimate } from './amounts.ts';
import type { DilutionFactor } from './concentrations.ts';

/** One aliquot as the runs see it. */
export interface AliquotEstimate {
  readonly aliquot: string;
  readonly run: string | null;
  readonly estimate: AmountEstimate;
  /** Effects of the shared sources on the amounts: species rows × sources, mol/L per standard deviation. */
  readonly effects: readonly Float64Array[];
  readonly dilution: DilutionFactor;
}
