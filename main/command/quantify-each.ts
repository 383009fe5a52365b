import { stat } from 'node:fs/promises';
import { type EachFitter, eachFitter, threadsFor } from './each-fitter.ts';
import { eachItems } from './each-items.ts';
import type { EachLines } from './each-line.ts';
import { EachProgress } from './each-progress.ts';
import { type ExitCode, exitCodes } from './exit-codes.ts';
import { openSheetFile } from './sheet-file.ts';
import type { Streams } from './streams.ts';

/**
 * Fits every trace of every file as an aliquot of the sheet, one line each, in input order. Streams:
 * a bounded number of traces is on its way at any time, and the next are read when those before
 * have been taken from standard output.
 */
export async function quantifyEachCommand(
  call: { readonly sheet: string; readonly files: readonly string[]; readonly json: boolean },
  streams: Streams,
  threads?: number,
): Promise<ExitCode> {
  const opened = await openSheetFile(call.sheet);
  for (const warning of opened.warnings) streams.say(warning);
  const fitter = eachFitter(
    { opened, json: call.json },
    threads ?? threadsFor(await bytesOf(call.files)),
  );
  const progress = new EachProgress(streams.say);
  try {
    await writeInOrder(call.files, fitter, async ({ text, fitted, refused, fault }) => {
      for (const sentence of refused) streams.say(sentence);
      if (text !== '') await streams.result(text);
      if (fault !== undefined) throw fault;
      progress.add({ fitted, refused: refused.length });
    });
  } finally {
    await fitter.close();
  }
  progress.finish();
  if (progress.refused === 0) return exitCodes.done;
  return progress.fitted > 0 ? exitCodes.someRefused : exitCodes.inputUnusable;
}

async function writeInOrder(
  files: readonly string[],
  { lines, ahead }: EachFitter,
  write: (lines: EachLines) => Promise<void>,
): Promise<void> {
  const underway: Promise<EachLines>[] = [];
  const writeFirst = async () => {
    const first = underway.shift();
    if (first) await write(await first);
  };
  for await (const group of eachItems(files)) {
    const coming = lines(group);
    // it is awaited when its turn has come; a failure waits until then
    coming.catch(() => {});
    underway.push(coming);
    if (underway.length >= ahead) await writeFirst();
  }
  while (underway.length > 0) await writeFirst();
}

async function bytesOf(files: readonly string[]): Promise<number> {
  let bytes = 0;
  for (const file of files) {
    try {
      bytes += (await stat(file)).size;
    } catch {
      // it is refused by name when its turn has come
    }
  }
  return bytes;
}
