import path from 'node:path';
import {
  quantify,
  type Reading,
  Refusal,
  reportCsv,
  reportHtml,
  resultsJson,
  type Sheet,
  sheetSources,
} from '../../analysis/index.ts';
import { writeWhole } from '../write-whole.ts';
import type { ExitCode } from './exit-codes.ts';
import { exitCodeOf } from './quantify.ts';
import { openSheetFile } from './sheet-file.ts';
import type { Streams } from './streams.ts';

/** Writes the report as one self-contained file; the ending says which. */
export async function reportCommand(
  call: { readonly sheet: string; readonly to: string; readonly json: boolean },
  streams: Streams,
): Promise<ExitCode> {
  const kind = path.extname(call.to).toLowerCase();
  if (!['.html', '.csv', '.json'].includes(kind)) {
    throw new Refusal({
      code: 'report-ending',
      message: `A report cannot be written as "${kind || 'a file without an ending'}".`,
      where: { file: call.to },
      mend: 'Name a file that ends in .html, .csv or .json.',
    });
  }
  const { sheet, readings, warnings } = await openSheetFile(call.sheet);
  for (const warning of warnings) streams.say(warning);
  const quantification = quantify(sheet, readings);
  const { results } = quantification;
  for (const { what, why } of results.refused) streams.say(`${what}: ${why}`);
  const text = {
    '.html': () => htmlOf(sheet, readings, quantification, warnings),
    '.csv': () => reportCsv(sheet, quantification),
    '.json': () => `${resultsJson(results)}\n`,
  }[kind];
  await writeWhole(call.to, text ? text() : '');
  await streams.result(`${call.json ? JSON.stringify(call.to) : call.to}\n`);
  return exitCodeOf(results);
}

function htmlOf(
  sheet: Sheet,
  readings: ReadonlyMap<string, Reading>,
  quantification: ReturnType<typeof quantify>,
  warnings: readonly string[],
): string {
  return reportHtml(sheet, quantification, {
    madeOn: new Date().toISOString(),
    program: quantification.results.program,
    warnings,
    sources: sheetSources(sheet, readings),
  });
}
