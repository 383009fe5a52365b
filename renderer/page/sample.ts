import type { SheetSource } from '../platform/platform.ts';

const sheets = import.meta.glob<string>('../../sample-data/*.sheet.json', {
  query: '?url',
  import: 'default',
  eager: true,
});
const exportFiles = import.meta.glob<string>('../../sample-data/{crude,standards}/*', {
  query: '?url',
  import: 'default',
  eager: true,
});
const folder = '../../sample-data/';

/** The invented sample, fetched from the app itself and read as any other sheet and exports are. */
export async function sampleSource(): Promise<SheetSource> {
  const [path, url] = Object.entries(sheets)[0] ?? [];
  if (path === undefined || url === undefined) throw new Error('the sample sheet was not built in');
  const text = await (await fetch(url)).text();
  const files = await Promise.all(
    Object.entries(exportFiles).map(async ([file, address]) => ({
      name: file.slice(folder.length),
      bytes: new Uint8Array(await (await fetch(address)).arrayBuffer()),
    })),
  );
  return { name: path.slice(folder.length), text, handle: null, files, missing: [] };
}
