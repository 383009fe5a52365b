import { describe, expect, it } from 'vitest';
import { Refusal } from '../../../analysis/index.ts';
import { browserPlatform, openedAll, sheetSource } from '../../../renderer/platform/browser.ts';

describe('files in a browser', () => {
  it('are read one by one; a folder among them is named and does not stop the others', async () => {
    const folder = new File([], 'folder');
    folder.arrayBuffer = () => Promise.reject(new DOMException('gone', 'NotFoundError'));
    const { files, unreadable } = await openedAll([
      new File(['240,1'], 'a.csv'),
      folder,
      new File(['250,2'], 'b.csv'),
    ]);
    expect(files.map(({ name }) => name)).toEqual(['a.csv', 'b.csv']);
    expect(new TextDecoder().decode(files[0]?.bytes)).toBe('240,1');
    expect(unreadable).toEqual(['folder']);
  });

  it('past what is ever read, only so much is taken into memory as says that it is too large', async () => {
    const huge = new File([], 'huge.csv');
    Object.defineProperty(huge, 'size', { value: 10 * 2 ** 30 });
    const asked: number[] = [];
    huge.slice = (_start, end = 0) => {
      asked.push(end);
      return new Blob(['x']);
    };
    await openedAll([huge]);
    expect(asked).toEqual([64 * 2 ** 20 + 1]);
  });

  it('a sheet comes alone, with no place to be saved to without asking', async () => {
    const source = await sheetSource(new File(['{}'], 'a.sheet.json'));
    expect(source).toEqual({
      name: 'a.sheet.json',
      text: '{}',
      handle: null,
      files: [],
      missing: [],
    });
  });

  it('a sheet larger than any sheet is refused before it is read', async () => {
    const huge = new File([], 'huge.sheet.json');
    Object.defineProperty(huge, 'size', { value: 2 ** 40 });
    await expect(sheetSource(huge)).rejects.toBeInstanceOf(Refusal);
  });
});

describe('saving in a browser that gives a handle', () => {
  const handle = (
    name: string,
    stream: { write: (text: string) => Promise<void>; close: () => Promise<void> },
  ) => ({ name, createWritable: async () => stream });

  it('writes whole and then closes, which is when the file changes', async () => {
    const done: string[] = [];
    const target = handle('a.sheet.json', {
      write: async (text) => void done.push(text),
      close: async () => void done.push('closed'),
    });
    const saved = await browserPlatform().saveSheet('text', target, 'suggested');
    expect(done).toEqual(['text', 'closed']);
    expect(saved).toEqual({ name: 'a.sheet.json', handle: target });
  });

  it('that fails is refused in words, and the file is not closed half written', async () => {
    let isClosed = false;
    const target = handle('a.sheet.json', {
      write: () => Promise.reject(new Error('no room')),
      close: async () => {
        isClosed = true;
      },
    });
    const saving = browserPlatform().saveSheet('text', target, 'suggested');
    await expect(saving).rejects.toSatisfy(
      (error) => error instanceof Refusal && error.message.includes('untouched'),
    );
    expect(isClosed).toBe(false);
  });
});
