import { describe, expect, it } from 'vitest';
import { timeLeftText } from '../../../renderer/sections/split/redraws-text.ts';

describe('how far the redraws are', () => {
  it('is told with the time left, from the pace so far', () => {
    expect(timeLeftText({ done: 500, of: 2000, elapsedMs: 4000 })).toBe(
      '500 of 2000, about 12 s left',
    );
  });

  it('is told in minutes where there are many', () => {
    expect(timeLeftText({ done: 100, of: 10_000, elapsedMs: 4000 })).toMatch(/about 7 min left$/);
  });

  it('says nothing of the time before it can be told', () => {
    expect(timeLeftText({ done: 3, of: 2000, elapsedMs: 900 })).toBe('3 of 2000');
  });
});
