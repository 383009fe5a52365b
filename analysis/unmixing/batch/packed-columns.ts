/** How many columns one pass over the points takes: as many sums as fit into registers for two spectra. */
export const tile = 5;

/** Columns laid out for passes over the points: tile by tile, point by point, zeros where a tile is not full. */
export interface PackedColumns {
  readonly points: number;
  readonly columns: number;
  /** Tiles × points × `tile`. */
  readonly values: Float64Array;
}

/** @param columns all of one length */
export function packedColumns(columns: readonly Float64Array[]): PackedColumns {
  const points = columns[0]?.length ?? 0;
  const values = new Float64Array(Math.ceil(columns.length / tile) * points * tile);
  for (const [k, column] of columns.entries()) {
    const from = Math.floor(k / tile) * points * tile + (k % tile);
    for (let i = 0; i < points; i++) values[from + i * tile] = column[i]!;
  }
  return { points, columns: columns.length, values };
}

/**
 * Inner products of the columns with two spectra in one pass, so that each column is read once for
 * both: out[k] and out[columns + k].
 *
 * @param a where the first spectrum begins in `spectra`
 * @param b where the second begins; the same place for a last one that has no partner
 */
export function innerProducts(
  { points, columns, values }: PackedColumns,
  spectra: Float64Array,
  a: number,
  b: number,
  out: Float64Array,
): void {
  for (let first = 0; first < columns; first += tile) {
    const base = first * points;
    let a0 = 0;
    let a1 = 0;
    let a2 = 0;
    let a3 = 0;
    let a4 = 0;
    let b0 = 0;
    let b1 = 0;
    let b2 = 0;
    let b3 = 0;
    let b4 = 0;
    for (let i = 0, at = base; i < points; i++, at += tile) {
      const y = spectra[a + i]!;
      const z = spectra[b + i]!;
      const q0 = values[at]!;
      const q1 = values[at + 1]!;
      const q2 = values[at + 2]!;
      const q3 = values[at + 3]!;
      const q4 = values[at + 4]!;
      a0 += q0 * y;
      a1 += q1 * y;
      a2 += q2 * y;
      a3 += q3 * y;
      a4 += q4 * y;
      b0 += q0 * z;
      b1 += q1 * z;
      b2 += q2 * z;
      b3 += q3 * z;
      b4 += q4 * z;
    }
    const left = Math.min(tile, columns - first);
    store(out, first, left, a0, a1, a2, a3, a4);
    store(out, columns + first, left, b0, b1, b2, b3, b4);
  }
}

/** The sums of one tile; those past its last column are left out. */
export function store(
  out: Float64Array,
  at: number,
  count: number,
  s0: number,
  s1: number,
  s2: number,
  s3: number,
  s4: number,
): void {
  out[at] = s0;
  if (count > 1) out[at + 1] = s1;
  if (count > 2) out[at + 2] = s2;
  if (count > 3) out[at + 3] = s3;
  if (count > 4) out[at + 4] = s4;
}
