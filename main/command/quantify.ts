import { quantify, resultsJson } from '../../analysis/index.ts';
import { type ExitCode, exitCodes } from './exit-codes.ts';
import { resultsTable } from './results-table.ts';
import { openSheetFile } from './sheet-file.ts';
import type { Streams } from './streams.ts';

/** Runs the whole sheet. */
export async function quantifyCommand(
  call: { readonly sheet: string; readonly json: boolean },
  streams: Streams,
): Promise<ExitCode> {
  const { sheet, readings, warnings } = await openSheetFile(call.sheet);
  for (const warning of warnings) streams.say(warning);
  const { results } = quantify(sheet, readings);
  for (const { what, why } of results.refused) streams.say(`${what}: ${why}`);
  await streams.result(call.json ? `${resultsJson(results)}\n` : resultsTable(sheet, results));
  return exitCodeOf(results);
}

/** All refused is as good as nothing done. */
export function exitCodeOf(results: {
  readonly aliquots: readonly unknown[];
  readonly refused: readonly unknown[];
}): ExitCode {
  if (results.refused.length === 0) return exitCodes.done;
  return results.aliquots.length > 0 ? exitCodes.someRefused : exitCodes.inputUnusable;
}
