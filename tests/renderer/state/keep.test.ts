import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { newSheet, setTitle } from '../../../analysis/index.ts';
import { leftBehind, startKeeping } from '../../../renderer/state/keep.ts';
import type { KeptStore } from '../../../renderer/state/kept-store.ts';
import { change, markSaved, replaceSheet, sheet } from '../../../renderer/state/store.ts';

function storeInMemory(): KeptStore & { readonly values: Map<string, unknown> } {
  const values = new Map<string, unknown>();
  return {
    values,
    put: async (key, value) => {
      // as a database does: a copy, not the thing itself
      values.set(key, structuredClone(value));
    },
    remove: async (key) => {
      values.delete(key);
    },
    all: async () => [...values],
  };
}

const nobody: ReadonlySet<string> = new Set();
const titled = (title: string): void =>
  change('set the title', (before) => setTitle(before, title));

beforeEach(() => {
  vi.useFakeTimers();
  replaceSheet(newSheet(), { name: null, handle: null, isSaved: true });
});
afterEach(() => {
  vi.useRealTimers();
});

describe('keeping the sheet', () => {
  it('keeps a change shortly after it was made, and gives it back as it was', async () => {
    const store = storeInMemory();
    startKeeping('page 1', store, () => {});
    titled('In the making');
    await vi.advanceTimersByTimeAsync(1000);
    const [kept] = await leftBehind(store, nobody);
    expect(kept?.sheet).toEqual(sheet.peek());
    expect(kept?.sheet.title).toBe('In the making');
  });

  it('keeps at once when the page is about to go', async () => {
    const store = storeInMemory();
    const { keepNow } = startKeeping('page 1', store, () => {});
    titled('Last words');
    await keepNow();
    expect((await leftBehind(store, nobody)).map((kept) => kept.sheet.title)).toEqual([
      'Last words',
    ]);
  });

  it('forgets the sheet once it is saved', async () => {
    const store = storeInMemory();
    const { keepNow } = startKeeping('page 1', store, () => {});
    titled('Saved soon');
    await keepNow();
    markSaved(sheet.peek(), 'a.sheet.json', null);
    await vi.advanceTimersByTimeAsync(1000);
    expect(store.values.size).toBe(0);
  });

  it('never touches what another page has left, nor when this one starts, opens or saves', async () => {
    const store = storeInMemory();
    await store.put('page 0', { sheet: setTitle(newSheet(), 'Crashed'), name: null, at: '2026' });
    const { keepNow } = startKeeping('page 1', store, () => {});
    await vi.advanceTimersByTimeAsync(1000);
    replaceSheet(newSheet(), { name: 'b.sheet.json', handle: null, isSaved: true });
    titled('Something else');
    await keepNow();
    markSaved(sheet.peek(), 'b.sheet.json', null);
    await vi.advanceTimersByTimeAsync(1000);
    expect((await leftBehind(store, nobody)).map((kept) => kept.sheet.title)).toEqual(['Crashed']);
  });

  it('tells once, not with every key, that a browser does not let it keep', async () => {
    const told: unknown[] = [];
    const full = async (): Promise<never> => {
      throw new Error('no room');
    };
    const { keepNow } = startKeeping(
      'page 1',
      { put: full, remove: full, all: async () => [] },
      (error) => told.push(error),
    );
    titled('one');
    await keepNow();
    titled('two');
    await keepNow();
    expect(told).toHaveLength(1);
  });
});

describe('what is offered back', () => {
  it('is what pages left that are no more, the newest first', async () => {
    const store = storeInMemory();
    const put = (page: string, at: string) =>
      store.put(page, { sheet: setTitle(newSheet(), page), name: null, at });
    await put('old', '2026-01-01T10:00:00Z');
    await put('new', '2026-01-02T10:00:00Z');
    await put('open in another window', '2026-01-03T10:00:00Z');
    const offered = await leftBehind(store, new Set(['open in another window']));
    expect(offered.map(({ page }) => page)).toEqual(['new', 'old']);
  });

  it('leaves out what is no sheet, and does not delete it', async () => {
    const store = storeInMemory();
    await store.put('broken', { sheet: { format: 'monobis-sheet', version: 1 }, at: '' });
    await store.put('strange', 7);
    expect(await leftBehind(store, nobody)).toEqual([]);
    expect(store.values.size).toBe(2);
  });
});
