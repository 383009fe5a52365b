import type { LineShapes } from './line-shapes.ts';

/** A stretch of data lines of one cell count, blank lines apart. Line indices, both included. */
export interface Segment {
  readonly first: number;
  readonly last: number;
  readonly cells: number;
  readonly rows: number;
  readonly strong: number;
}

export function segmentsOf(lines: LineShapes): readonly Segment[] {
  const segments: Segment[] = [];
  let open: { -readonly [K in keyof Segment]: Segment[K] } | null = null;
  for (let i = 0; i < lines.shapes.length; i += 1) {
    const shape = lines.shapes[i];
    if (shape === 'blank') continue;
    if (shape === 'text') {
      open = null;
      continue;
    }
    const cells = lines.cells[i] ?? 0;
    if (open === null || open.cells !== cells) {
      open = { first: i, last: i, cells, rows: 0, strong: 0 };
      segments.push(open);
    }
    open.last = i;
    open.rows += 1;
    if (shape === 'strong') open.strong += 1;
  }
  return segments;
}

/** The stretch with the most data lines; null where there is none. */
export function largestSegment(segments: readonly Segment[]): Segment | null {
  let best: Segment | null = null;
  for (const segment of segments) {
    if (segment.strong > (best?.strong ?? 0)) best = segment;
  }
  return best;
}

/** How the first numbers of a stretch run. */
export interface Course {
  readonly direction: 1 | -1;
  /** Median distance of neighbours, greater than 0. */
  readonly step: number;
}

/** Null where the rows are too few or do not run one way for the most part. */
export function courseOf(lines: LineShapes, rows: readonly number[]): Course | null {
  const steps: number[] = [];
  let balance = 0;
  for (let i = 1; i < rows.length; i += 1) {
    const step =
      (lines.leads[rows[i] ?? -1] ?? Number.NaN) - (lines.leads[rows[i - 1] ?? -1] ?? Number.NaN);
    if (!Number.isFinite(step) || step === 0) continue;
    steps.push(Math.abs(step));
    balance += Math.sign(step);
  }
  if (balance === 0) return null;
  steps.sort((a, b) => a - b);
  return { direction: balance > 0 ? 1 : -1, step: steps[Math.floor(steps.length / 2)] ?? 1 };
}

/** Line indices of the data lines from `first` to `last`. */
export function rowsBetween(lines: LineShapes, first: number, last: number): number[] {
  const rows: number[] = [];
  for (let i = first; i <= last; i += 1) {
    const shape = lines.shapes[i];
    if (shape === 'strong' || shape === 'weak') rows.push(i);
  }
  return rows;
}

/**
 * Whether the row at `to` goes on where the row at `from` stands, in the order of the course, by no
 * more than about twice what the lines between them would take (steps may be uneven, rows run together).
 */
export function goesOn(lines: LineShapes, course: Course, from: number, to: number): boolean {
  const forward = to > from ? 1 : -1;
  const away =
    ((lines.leads[to] ?? Number.NaN) - (lines.leads[from] ?? Number.NaN)) *
    course.direction *
    forward;
  return away > 0 && away <= (2 * Math.abs(to - from) + 1) * course.step;
}
