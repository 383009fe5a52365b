import { mkdir, writeFile } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { committedSeed } from './parameters.ts';
import { makeSample, sheetFile, truthFile } from './scenario.ts';

/** Writes the invented sample beside this script: `npm run sample`. */
const folder = import.meta.dirname;
const sample = makeSample(committedSeed);
const files = new Map<string, Uint8Array | string>([
  ...sample.files,
  ['piperazine.sheet.json', sheetFile(sample)],
  ['truth.json', truthFile(sample)],
]);
for (const [path, content] of files) {
  const target = join(folder, path);
  await mkdir(dirname(target), { recursive: true });
  await writeFile(target, content);
}
console.log(`${files.size} files written with seed ${committedSeed}`);
