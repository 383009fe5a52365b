import { type Reading, readingToJson } from '../../analysis/index.ts';
import { type ExitCode, exitCodes } from './exit-codes.ts';
import { readExportFile } from './sheet-file.ts';
import type { Streams } from './streams.ts';
import { table } from './table.ts';

/** Shows what the importer understood of each export. */
export async function readCommand(
  { files, json }: { readonly files: readonly string[]; readonly json: boolean },
  streams: Streams,
): Promise<ExitCode> {
  const readings: Reading[] = [];
  let missing = 0;
  for (const file of files) {
    const reading = await readExportFile(file, file);
    if (reading) readings.push(reading);
    else {
      missing++;
      streams.say(`${file}: There is no such file. Check the path.`);
    }
  }
  for (const { file, refused } of readings) {
    for (const { what, why, line } of refused) {
      streams.say(
        [file, line === null ? null : `line ${line}`, `${what}: ${why}`].filter(Boolean).join(', '),
      );
    }
  }
  await streams.result(
    json
      ? `${JSON.stringify(readings.map(readingToJson))}\n`
      : readings.map(readingText).join('\n'),
  );
  if (!readings.some(({ spectra }) => spectra.length > 0)) return exitCodes.inputUnusable;
  const clean = missing === 0 && readings.every(({ refused }) => refused.length === 0);
  return clean ? exitCodes.done : exitCodes.someRefused;
}

function readingText(reading: Reading): string {
  const { file, encoding, delimiter, decimal, spectra, sha256 } = reading;
  if (spectra.length === 0) return `${file}\n  nothing could be read\n`;
  const rows = spectra.map(({ name, quantity, points, wavelengthNm }, trace) => [
    String(trace),
    name,
    quantity,
    String(points),
    `${wavelengthNm[0]} to ${wavelengthNm.at(-1)}`,
  ]);
  const assumptions = spectra.flatMap((spectrum, trace) =>
    spectrum.assumptions.map((text) => `  trace ${trace}: ${text}`),
  );
  return [
    `${file}`,
    `  ${encoding}, delimiter ${delimiter}, decimal ${decimal}, SHA-256 ${sha256}`,
    table(['trace', 'name', 'quantity', 'points', 'nm'], rows, '  '),
    ...assumptions,
    '',
  ].join('\n');
}
