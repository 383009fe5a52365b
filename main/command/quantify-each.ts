import {
  type AliquotResult,
  type PreparedSheet,
  prepare,
  quantifyAliquot,
  type Reading,
  Refusal,
  type RefusedPart,
  refusalSentence,
  type SheetAliquot,
} from '../../analysis/index.ts';
import { type ExitCode, exitCodes } from './exit-codes.ts';
import { openSheetFile, readExportFile } from './sheet-file.ts';
import type { Streams } from './streams.ts';

/** Fits every trace of every file as an aliquot of the sheet, one line each, in input order. */
export async function quantifyEachCommand(
  call: { readonly sheet: string; readonly files: readonly string[]; readonly json: boolean },
  streams: Streams,
): Promise<ExitCode> {
  const { sheet, readings, warnings } = await openSheetFile(call.sheet);
  for (const warning of warnings) streams.say(warning);
  const prepared = prepare(sheet, readings);
  let done = 0;
  let refused = 0;
  for (const file of call.files) {
    for await (const line of linesOf(prepared, file)) {
      if ('refused' in line) {
        refused++;
        streams.say(`${line.aliquot}: ${line.refused.why}`);
      } else done++;
      await streams.result(`${call.json ? JSON.stringify(line) : lineText(line)}\n`);
    }
    streams.say(`${file}: ${done} fitted, ${refused} refused so far`);
  }
  if (refused === 0) return exitCodes.done;
  return done > 0 ? exitCodes.someRefused : exitCodes.inputUnusable;
}

/** A trace that was refused keeps its place in the output. */
interface RefusedLine {
  readonly aliquot: string;
  readonly refused: Pick<RefusedPart, 'what' | 'why' | 'line'>;
}

async function* linesOf(
  prepared: PreparedSheet,
  file: string,
): AsyncGenerator<AliquotResult | RefusedLine> {
  const reading = await readExportFile(file, file);
  if (!reading) {
    const why = 'There is no such file. Check the path.';
    yield { aliquot: file, refused: { what: 'the file', why, line: null } };
    return;
  }
  const readings = new Map([[file, reading]]);
  for (const [index, { trace = index }] of reading.spectra.entries()) {
    const aliquot: SheetAliquot = { id: `${file}#${trace}`, spectrum: { file, trace } };
    yield fitted(prepared, aliquot, readings);
  }
  for (const { what, why, line } of reading.refused) {
    yield { aliquot: file, refused: { what, why, line } };
  }
}

function fitted(
  prepared: PreparedSheet,
  aliquot: SheetAliquot,
  readings: ReadonlyMap<string, Reading>,
): AliquotResult | RefusedLine {
  try {
    return quantifyAliquot(prepared, aliquot, readings).result;
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    const { line = null } = error.where;
    const why = refusalSentence({ code: error.code, message: error.message, mend: error.mend });
    return { aliquot: aliquot.id, refused: { what: aliquot.id, why, line } };
  }
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
