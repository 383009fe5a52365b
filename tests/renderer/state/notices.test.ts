import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Refusal } from '../../../analysis/index.ts';
import {
  attempt,
  dismiss,
  dismissAll,
  mention,
  notices,
  notify,
} from '../../../renderer/state/notices.ts';

beforeEach(() => {
  dismissAll();
});

afterEach(() => {
  vi.useRealTimers();
});

describe('what goes wrong', () => {
  it('is told in the words of a refusal, with where and what would mend it', async () => {
    await attempt(() => {
      throw new Refusal({
        code: 'empty',
        message: 'The file is empty.',
        where: { file: 'a.csv' },
        mend: 'Export it again.',
      });
    });
    expect(notices.value.map(({ kind, text }) => [kind, text])).toEqual([
      ['refusal', 'a.csv: The file is empty. Export it again.'],
    ]);
  });

  it('is called a fault of the program if it is one, with no stack in what is shown', async () => {
    await attempt(async () => {
      throw new TypeError('x is not a function');
    });
    const [notice] = notices.value;
    expect(notice?.kind).toBe('fault');
    expect(notice?.text).toContain('Your sheet is as it was');
    expect(notice?.details).toEqual(['TypeError: x is not a function']);
    // the copy for a report has the place in the program
    expect(notice?.copy).toContain('notices.test.ts');
  });

  it('stands once, however often it comes', async () => {
    for (let i = 0; i < 5; i++) {
      await attempt(() => {
        throw new Error('every key');
      });
    }
    expect(notices.value).toHaveLength(1);
  });
});

describe('notices', () => {
  it('stay until each is dismissed', () => {
    notify('news', 'one');
    notify('news', 'two');
    const [first] = notices.value;
    if (first) dismiss(first.id);
    expect(notices.value.map(({ text }) => text)).toEqual(['two']);
  });

  it('go by themselves only where the page says the same elsewhere', () => {
    vi.useFakeTimers();
    notify('refusal', 'a file could not be read');
    mention('Saved as a.sheet.json.');
    expect(notices.value).toHaveLength(2);
    vi.advanceTimersByTime(60_000);
    expect(notices.value.map(({ text }) => text)).toEqual(['a file could not be read']);
  });
});
