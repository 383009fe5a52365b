import type { EachItem } from './each-line.ts';
import { readExportFile } from './sheet-file.ts';

/** So many traces go to a thread at a time: a message costs little beside their fits. */
const perGroup = 32;

/**
 * The traces of the files in their order, in groups. One file is in memory at a time, and of it
 * only what has not been handed on; small files share a group.
 */
export async function* eachItems(files: readonly string[]): AsyncGenerator<readonly EachItem[]> {
  let group: EachItem[] = [];
  for (const file of files) {
    // newest last: what is handed on is let go of
    const waiting = (await itemsOf(file)).reverse();
    for (let item = waiting.pop(); item; item = waiting.pop()) {
      group.push(item);
      if (group.length < perGroup) continue;
      yield group;
      group = [];
    }
  }
  if (group.length > 0) yield group;
}

async function itemsOf(file: string): Promise<EachItem[]> {
  const reading = await readExportFile(file, file);
  if (!reading) {
    const why = 'There is no such file. Check the path.';
    return [{ aliquot: file, refused: { what: 'the file', why, line: null } }];
  }
  return [
    ...reading.spectra.map((spectrum, index) => {
      const { trace = index } = spectrum;
      // what the reader assumed is for `read` to show; a fit does not look at it
      return {
        aliquot: `${file}#${trace}`,
        file,
        spectrum: { ...spectrum, trace, assumptions: [] },
      };
    }),
    ...reading.refused.map(({ what, why, line }) => ({
      aliquot: file,
      refused: { what, why, line },
    })),
  ];
}
