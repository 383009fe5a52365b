import {
  type AliquotResult,
  type PreparedSheet,
  quantifyAliquot,
  type Reading,
  Refusal,
  type RefusedPart,
  refusalSentence,
} from '../../analysis/index.ts';

type ReadSpectrum = Reading['spectra'][number];

/** One line of output to come: a trace to fit, or what was refused before it got there. */
export type EachItem =
  | { readonly aliquot: string; readonly file: string; readonly spectrum: ReadSpectrum }
  | RefusedLine;

/** A trace that was refused keeps its place in the output. */
interface RefusedLine {
  readonly aliquot: string;
  readonly refused: Pick<RefusedPart, 'what' | 'why' | 'line'>;
}

/** Finished lines, in the order of the items. Plain, so that it crosses threads as it is. */
export interface EachLines {
  /** Each with its line end. */
  readonly text: string;
  readonly fitted: number;
  /** One sentence for each that was refused. */
  readonly refused: readonly string[];
  /** A fault of the program that stopped the work after these lines. */
  readonly fault?: unknown;
}

/** Fits a few traces and writes their lines. Never throws: a fault ends the lines and stands in `fault`. */
export function linesOf(
  prepared: PreparedSheet,
  items: readonly EachItem[],
  { json }: { readonly json: boolean },
): EachLines {
  let text = '';
  let done = 0;
  const refused: string[] = [];
  try {
    for (const item of items) {
      const line = 'refused' in item ? item : fitted(prepared, item);
      if ('refused' in line) refused.push(`${line.aliquot}: ${line.refused.why}`);
      else done++;
      text += `${json ? JSON.stringify(line) : lineText(line)}\n`;
    }
  } catch (fault) {
    return { text, fitted: done, refused, fault };
  }
  return { text, fitted: done, refused };
}

function fitted(
  prepared: PreparedSheet,
  { aliquot, file, spectrum }: Exclude<EachItem, RefusedLine>,
): AliquotResult | RefusedLine {
  const trace = spectrum.trace ?? 0;
  const wanted = { id: aliquot, spectrum: { file, trace } };
  try {
    return quantifyAliquot(prepared, wanted, new Map([[file, readingOfOne(file, spectrum)]]))
      .result;
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    const { line = null } = error.where;
    const why = refusalSentence({ code: error.code, message: error.message, mend: error.mend });
    return { aliquot, refused: { what: aliquot, why, line } };
  }
}

function readingOfOne(file: string, spectrum: ReadSpectrum): Reading {
  return {
    format: 'monobis-reading',
    version: 1,
    file,
    sha256: '',
    encoding: '',
    delimiter: '',
    decimal: '',
    spectra: [spectrum],
    refused: [],
  };
}

function lineText(line: AliquotResult | RefusedLine): string {
  if ('refused' in line) return `${line.aliquot}  refused: ${line.refused.why}`;
  const split = line.split.map(({ species, fraction: { value, interval95 } }) => {
    const [low, high] = interval95.map((end) => (end === null ? '?' : (100 * end).toFixed(2)));
    const middle = value === null ? '?' : (100 * value).toFixed(2);
    return `${species} ${middle} % (${low} to ${high})`;
  });
  const doubts = line.doubts.map(({ code }) => code).join(', ');
  return `${line.aliquot}  ${split.join('  ')}${doubts === '' ? '' : `  ! ${doubts}`}`;
}
