import type { DecimalSign } from './number-cell.ts';
import type { Delimiter } from './split-cells.ts';

/** One line of data; all rows of a table have the same number of cells. */
export interface DataRow {
  readonly line: number;
  readonly cells: readonly string[];
}

export interface TextLine {
  readonly line: number;
  readonly text: string;
}

/** The numbers of an export with what stands around them; what they mean is a layout's to say. */
export interface Table {
  readonly delimiter: Delimiter;
  readonly decimal: DecimalSign;
  /** See `SettledDecimal`. */
  readonly decimalEvidence: 'settled' | 'open';
  readonly columns: number;
  readonly rows: readonly DataRow[];
  /** Lines of headings above the data, the nearest last; each has one cell a column. */
  readonly headings: readonly DataRow[];
  /** A heading line that could not be divided into the columns; its words hold for all of them. */
  readonly looseHeading: TextLine | null;
  /** Lines before and after the data that are neither data nor headings. */
  readonly surroundings: readonly TextLine[];
  /** The last row ends the file without a line end. */
  readonly lastRowIsOpen: boolean;
  readonly assumptions: readonly string[];
}
