import type { AxisUnit } from '../column-words.ts';
import type { QuantityWord } from '../quantity-words.ts';
import type { RefusedPart } from '../reading.ts';
import type { Table } from '../table.ts';

/** One trace as it stands in the file, before order, units and quantity are settled. */
export interface RawTrace {
  /** For messages: `trace 2 ("bis")`. */
  readonly what: string;
  readonly name: string;
  /** Zero-based, among all traces of the file, those counted that are refused. */
  readonly position: number;
  readonly unit: AxisUnit;
  /** In the file's unit and order; finite. */
  readonly x: Float64Array;
  /** In the file's quantity and order; NaN where the file gives no value. */
  readonly y: Float64Array;
  /** Line of each point. */
  readonly lines: Uint32Array;
  readonly quantity: QuantityWord | null;
  /** `open`: the values look like "1,234" throughout, so that only the quantity can tell their size. */
  readonly decimal: 'settled' | 'open-comma' | 'open-point';
  readonly assumptions: readonly string[];
}

export interface TracesFound {
  readonly traces: readonly RawTrace[];
  readonly refused: readonly RefusedPart[];
}

/** One way to lay out spectra in a table. */
export interface Layout {
  /** In words, for people: "one wavelength column, many traces". */
  readonly name: string;
  /**
   * The traces, or null where the table is not of this layout. Throws `Refusal` where it is, but
   * cannot be used.
   */
  readonly read: (table: Table) => TracesFound | null;
}
