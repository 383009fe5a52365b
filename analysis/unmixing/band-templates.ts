/** Widths of the bands looked for, standard deviation in nm. */
export const widthsNm = [4, 8, 15, 25] as const;
/** A band ends this many standard deviations from its middle. */
export const farInWidths = 4;

/** A block is a quarter of a width: what a band does within one is a twentieth of its norm. */
const blocksAWidth = 4;

/** Gaussian bands of one width at every place of a grid, averaged over blocks of neighbouring points. */
export interface BandTemplates {
  readonly widthNm: number;
  /** Points in a block (fewer in the last). */
  readonly points: number;
  /** Wavelengths of the middles. */
  readonly centres: Float64Array;
  /** First point of each band. */
  readonly first: Int32Array;
  /** Where each band's points begin in `bands`; one more than there are bands. */
  readonly pointStart: Int32Array;
  /** The bands, point by point; band after band. */
  readonly bands: Float64Array;
  /** First block of each band. */
  readonly from: Int32Array;
  /** Where each band's entries begin in `values` and `squares`; one more than there are bands. */
  readonly start: Int32Array;
  /** Mean of the band over each of its blocks, and of its square; band after band. */
  readonly values: Float64Array;
  readonly squares: Float64Array;
}

interface Known {
  readonly nm: Float64Array;
  readonly templates: readonly BandTemplates[];
}

let known: Known[] = [];
/** The grid of a batch, and a few of those beside it. */
const mostKnown = 4;

/** The bands on this grid, all widths. Spectra on one grid share them. */
export function bandTemplates(nm: Float64Array): readonly BandTemplates[] {
  const before = known.find((each) => isSame(each.nm, nm));
  if (before) return before.templates;
  const made = {
    nm: nm.slice(),
    templates: widthsNm.map((width) => templatesOf(nm, width)),
  };
  known = [made, ...known].slice(0, mostKnown);
  return made.templates;
}

function isSame(a: Float64Array, b: Float64Array): boolean {
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return false;
  return true;
}

function templatesOf(nm: Float64Array, widthNm: number): BandTemplates {
  const step = stepOf(nm);
  const stride = Math.max(1, Math.round(widthNm / 4 / step));
  const points = Math.max(1, Math.floor(widthNm / blocksAWidth / step));
  const centres = nm.filter((_, i) => i % stride === 0);
  const from = new Int32Array(centres.length);
  const firsts = new Int32Array(centres.length);
  const start = new Int32Array(centres.length + 1);
  const pointStart = new Int32Array(centres.length + 1);
  const bands: number[] = [];
  const values: number[] = [];
  const squares: number[] = [];
  for (const [c, centre] of centres.entries()) {
    const inside = (i: number) => Math.abs((nm[i]! - centre) / widthNm) <= farInWidths;
    let first = 0;
    while (!inside(first)) first++;
    let end = first;
    while (end < nm.length && inside(end)) end++;
    firsts[c] = first;
    from[c] = Math.floor(first / points);
    for (let block = from[c]!; block * points < end; block++) {
      const last = Math.min((block + 1) * points, nm.length);
      let [sum, square] = [0, 0];
      for (let i = block * points; i < last; i++) {
        if (i < first || i >= end) continue;
        const value = Math.exp(-0.5 * ((nm[i]! - centre) / widthNm) ** 2);
        bands.push(value);
        sum += value;
        square += value * value;
      }
      values.push(sum / (last - block * points));
      squares.push(square / (last - block * points));
    }
    start[c + 1] = values.length;
    pointStart[c + 1] = bands.length;
  }
  return {
    widthNm,
    points,
    centres,
    first: firsts,
    pointStart,
    bands: Float64Array.from(bands),
    from,
    start,
    values: Float64Array.from(values),
    squares: Float64Array.from(squares),
  };
}

/** Mean distance of neighbours, nm. */
export function stepOf(nm: Float64Array): number {
  return ((nm.at(-1) ?? 0) - (nm[0] ?? 0)) / Math.max(nm.length - 1, 1);
}
