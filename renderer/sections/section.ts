import type { Quantification, Sheet } from '../../analysis/index.ts';

/** What every section of the sheet is given, and the one way it changes the sheet. */
export interface SectionProps {
  readonly sheet: Sheet;
  /** The last answer; null while there is nothing to fit yet or before the first one is there. */
  readonly quantification: Quantification | null;
  /** Why the sheet as a whole cannot be computed yet, in words; null if it can. */
  readonly obstacle: string | null;
  /** The aliquot that Fit and Split point at. */
  readonly aliquot: string | null;
  /**
   * Replaces the sheet by `edit(sheet)`. `label` names the change for undo ("move window").
   * Changes with the same non-empty `gesture` (a drag) fold into one undo step.
   */
  readonly change: (label: string, edit: (sheet: Sheet) => Sheet, gesture?: string) => void;
  readonly chooseAliquot: (id: string) => void;
}
