import { type PackedColumns, store, tile } from './packed-columns.ts';

/**
 * AᵀWA (upper triangle, by rows) and AᵀWy of one spectrum, in one pass for up to five columns.
 *
 * @param weights one a point
 * @param spectra holds the spectrum from `from` on
 * @param gram columns × columns, by rows; only its upper triangle is written
 */
export function weightedGram(
  packed: PackedColumns,
  weights: Float64Array,
  spectra: Float64Array,
  from: number,
  into: { readonly gram: Float64Array; readonly right: Float64Array },
): void {
  if (packed.columns <= tile) gramOfOneTile(packed, weights, spectra, from, into);
  else gramOfTiles(packed, weights, spectra, from, into);
}

function gramOfOneTile(
  { points, columns, values }: PackedColumns,
  weights: Float64Array,
  spectra: Float64Array,
  from: number,
  { gram, right }: { readonly gram: Float64Array; readonly right: Float64Array },
): void {
  let g00 = 0;
  let g01 = 0;
  let g02 = 0;
  let g03 = 0;
  let g04 = 0;
  let g11 = 0;
  let g12 = 0;
  let g13 = 0;
  let g14 = 0;
  let g22 = 0;
  let g23 = 0;
  let g24 = 0;
  let g33 = 0;
  let g34 = 0;
  let g44 = 0;
  let r0 = 0;
  let r1 = 0;
  let r2 = 0;
  let r3 = 0;
  let r4 = 0;
  for (let i = 0, at = 0; i < points; i++, at += tile) {
    const weight = weights[i]!;
    const y = spectra[from + i]!;
    const a0 = values[at]!;
    const a1 = values[at + 1]!;
    const a2 = values[at + 2]!;
    const a3 = values[at + 3]!;
    const a4 = values[at + 4]!;
    const w0 = weight * a0;
    const w1 = weight * a1;
    const w2 = weight * a2;
    const w3 = weight * a3;
    const w4 = weight * a4;
    g00 += w0 * a0;
    g01 += w0 * a1;
    g02 += w0 * a2;
    g03 += w0 * a3;
    g04 += w0 * a4;
    g11 += w1 * a1;
    g12 += w1 * a2;
    g13 += w1 * a3;
    g14 += w1 * a4;
    g22 += w2 * a2;
    g23 += w2 * a3;
    g24 += w2 * a4;
    g33 += w3 * a3;
    g34 += w3 * a4;
    g44 += w4 * a4;
    r0 += w0 * y;
    r1 += w1 * y;
    r2 += w2 * y;
    r3 += w3 * y;
    r4 += w4 * y;
  }
  const n = columns;
  store(gram, 0, n, g00, g01, g02, g03, g04);
  if (n > 1) store(gram, n + 1, n - 1, g11, g12, g13, g14, 0);
  if (n > 2) store(gram, 2 * n + 2, n - 2, g22, g23, g24, 0, 0);
  if (n > 3) store(gram, 3 * n + 3, n - 3, g33, g34, 0, 0, 0);
  if (n > 4) store(gram, 4 * n + 4, n - 4, g44, 0, 0, 0, 0);
  store(right, 0, n, r0, r1, r2, r3, r4);
}

function gramOfTiles(
  { points, columns, values }: PackedColumns,
  weights: Float64Array,
  spectra: Float64Array,
  from: number,
  { gram, right }: { readonly gram: Float64Array; readonly right: Float64Array },
): void {
  const place = (k: number) => Math.floor(k / tile) * points * tile + (k % tile);
  for (let k = 0; k < columns; k++) {
    const a = place(k);
    let along = 0;
    for (let i = 0; i < points; i++)
      along += weights[i]! * values[a + i * tile]! * spectra[from + i]!;
    right[k] = along;
    for (let l = k; l < columns; l++) {
      const b = place(l);
      let sum = 0;
      for (let i = 0; i < points; i++) {
        sum += weights[i]! * values[a + i * tile]! * values[b + i * tile]!;
      }
      gram[k * columns + l] = sum;
    }
  }
}

/** Σ columns · parameters at each point. */
export function modelInto(
  { points, columns, values }: PackedColumns,
  parameters: Float64Array,
  fitted: Float64Array,
): void {
  for (let first = 0; first < columns; first += tile) {
    const p0 = parameters[first] ?? 0;
    const p1 = first + 1 < columns ? parameters[first + 1]! : 0;
    const p2 = first + 2 < columns ? parameters[first + 2]! : 0;
    const p3 = first + 3 < columns ? parameters[first + 3]! : 0;
    const p4 = first + 4 < columns ? parameters[first + 4]! : 0;
    for (let i = 0, at = first * points; i < points; i++, at += tile) {
      const part =
        p0 * values[at]! +
        p1 * values[at + 1]! +
        p2 * values[at + 2]! +
        p3 * values[at + 3]! +
        p4 * values[at + 4]!;
      fitted[i] = first === 0 ? part : fitted[i]! + part;
    }
  }
}
