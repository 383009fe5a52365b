import { Refusal } from '../refusal.ts';
import {
  type Course,
  courseOf,
  goesOn,
  largestSegment,
  rowsBetween,
  type Segment,
  segmentsOf,
} from './data-segments.ts';
import { type LineShapes, lineShapes } from './line-shapes.ts';
import type { Delimiter } from './split-cells.ts';
import type { Lines } from './split-lines.ts';

/** Where the data stand: line indices of the rows, all under one delimiter and of one cell count. */
export interface DataBlock {
  readonly delimiter: Delimiter;
  readonly cells: number;
  readonly rows: readonly number[];
  readonly assumptions: readonly string[];
}

/** A tie goes to the first: a tab is also white space. */
const delimiters: readonly Delimiter[] = ['tab', 'semicolon', 'comma', 'space'];

/**
 * Finds the data among header and footer lines, under the delimiter that makes the longest stretch
 * of rows. Throws `Refusal` (`no-numbers`, `text-in-the-data`, `ragged-row`, `several-blocks`).
 */
export function findDataBlock(text: Lines): DataBlock {
  let best: Found | null = null;
  for (const delimiter of delimiters) {
    const shapes = lineShapes(text.lines, delimiter);
    if (shapes.strong === 0) continue;
    const segments = segmentsOf(shapes);
    const main = largestSegment(segments);
    if (main && main.strong > (best?.main.strong ?? 0)) best = { shapes, segments, main };
  }
  if (!best) throw noNumbers(text.lines);
  return trimmed(best, text);
}

/** The lines under one delimiter, with the stretch that has the most rows. */
interface Found {
  readonly shapes: LineShapes;
  readonly segments: readonly Segment[];
  readonly main: Segment;
}

function noNumbers(lines: readonly string[]): Refusal {
  const index = lines.findIndex((line) => line.trim() !== '');
  const start = (lines[index] ?? '').trim().slice(0, 60);
  return new Refusal({
    code: 'no-numbers',
    message: `No line holds a wavelength and a value beside it. The file begins with "${start}".`,
    where: { line: index + 1 },
    mend: 'Load the text export of a spectrum: one wavelength a line with its value beside it.',
  });
}

function trimmed(found: Found, text: Lines): DataBlock {
  const { shapes, segments, main } = found;
  const all = rowsBetween(shapes, main.first, main.last);
  const course = courseOf(shapes, all);
  const { rows, assumptions } = course
    ? withoutStandingApart(shapes, course, withoutWeakEdges(shapes, course, all))
    : { rows: all, assumptions: [] };
  const notes = [...assumptions];
  for (const segment of segments) {
    if (segment === main) continue;
    const note =
      (course && goingOn(found, course, rows, segment, text)) ?? standingApart(segment, main);
    if (note) notes.push(note);
  }
  return { delimiter: shapes.delimiter, cells: main.cells, rows, assumptions: notes };
}

/** Header or footer lines that begin with a number ("5 scans") are no data unless they go on with it. */
function withoutWeakEdges(
  shapes: LineShapes,
  course: Course,
  rows: readonly number[],
): readonly number[] {
  let start = rows.findIndex((row) => shapes.shapes[row] === 'strong');
  let end = rows.findLastIndex((row) => shapes.shapes[row] === 'strong');
  while (start > 0 && goesOn(shapes, course, rows[start] ?? 0, rows[start - 1] ?? 0)) start -= 1;
  while (end < rows.length - 1 && goesOn(shapes, course, rows[end] ?? 0, rows[end + 1] ?? 0))
    end += 1;
  return rows.slice(start, end + 1);
}

const FEW_ROWS = 3;

/** A few rows of numbers behind a blank line that break the order are a header or a footer. */
function withoutStandingApart(shapes: LineShapes, course: Course, rows: readonly number[]) {
  const few = Math.max(FEW_ROWS, rows.length / 20);
  const breaks: number[] = [];
  for (let i = 1; i < rows.length; i += 1) {
    const before = rows[i - 1] ?? 0;
    const here = rows[i] ?? 0;
    const onward = ((shapes.leads[here] ?? 0) - (shapes.leads[before] ?? 0)) * course.direction > 0;
    if (here > before + 1 && !onward) breaks.push(i);
  }
  const start = breaks.findLast((at) => at <= few && at < rows.length / 2) ?? 0;
  const end = breaks.find((at) => at > start && rows.length - at <= few) ?? rows.length;
  const assumptions = [rows.slice(0, start), rows.slice(end)]
    .filter((apart) => apart.length > 0)
    .map((apart) => standsApart((apart[0] ?? 0) + 1, (apart.at(-1) ?? 0) + 1));
  return { rows: rows.slice(start, end), assumptions };
}

function standsApart(first: number, last: number): string {
  const lines = first === last ? `Line ${first} holds` : `Lines ${first} to ${last} hold`;
  return `${lines} numbers that stand apart from the data and were left out.`;
}

/**
 * Numbers outside the block that go on where it ends belong to it: refused, but for a last line
 * that was cut, which is told. Null where the numbers do not go on with the block.
 */
function goingOn(
  { shapes, main }: Found,
  course: Course,
  rows: readonly number[],
  segment: Segment,
  { lines, lastIsOpen }: Lines,
): string | null {
  const isBefore = segment.first < main.first;
  const edge = (isBefore ? rows[0] : rows.at(-1)) ?? main.first;
  const near = isBefore ? segment.last : segment.first;
  if (!goesOn(shapes, course, edge, near)) return null;
  const isCut = lastIsOpen && segment.first === lines.length - 1 && segment.cells < main.cells;
  if (!isCut) throw brokenData(shapes, edge, near, main);
  return `Line ${segment.first + 1}, the last, stops half way and has no line end: the file seems to have been cut, and this line was left out.`;
}

/** A note on numbers that have nothing to do with the block; refuses what is a block of its own. */
function standingApart(segment: Segment, main: Segment): string | null {
  const many = Math.max(FEW_ROWS, main.strong / 20);
  if (segment.cells === main.cells && segment.strong >= many) throw severalBlocks(segment, main);
  return segment.strong === 0 ? null : standsApart(segment.first + 1, segment.last + 1);
}

function severalBlocks(segment: Segment, main: Segment): Refusal {
  return new Refusal({
    code: 'several-blocks',
    message: `The file holds several blocks of numbers one after the other (lines ${Math.min(segment.first, main.first) + 1} and ${Math.max(segment.first, main.first) + 1} begin two of them).`,
    where: { line: Math.max(segment.first, main.first) + 1 },
    mend: 'Export one spectrum a file, or the traces side by side.',
  });
}

/** The line between the edge of the block and the numbers that go on with it is to blame. */
function brokenData(shapes: LineShapes, edge: number, near: number, main: Segment): Refusal {
  const step = near > edge ? 1 : -1;
  let at = edge + step;
  while (at !== near && shapes.shapes[at] === 'blank') at += step;
  if (shapes.cells[at] !== 0) {
    return new Refusal({
      code: 'ragged-row',
      message: `This line has ${shapes.cells[at]} cells where the other lines have ${main.cells}.`,
      where: { line: at + 1 },
      mend: 'Export again, or mend this line so that every line has one cell for each column.',
    });
  }
  return new Refusal({
    code: 'text-in-the-data',
    message: 'This line is no row of numbers like those before and after it.',
    where: { line: at + 1 },
    mend: 'Export again, or mend or remove this line.',
  });
}
