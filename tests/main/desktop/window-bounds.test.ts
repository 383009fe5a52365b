import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { keepBounds, lastBounds } from '../../../main/desktop/window-bounds.ts';

const folder = mkdtempSync(path.join(tmpdir(), 'monobis-bounds-'));
const file = path.join(folder, 'window.json');
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const screens = [
  { x: 0, y: 0, width: 1920, height: 1040 },
  { x: 1920, y: 0, width: 1280, height: 1024 },
];

describe('where the window stood', () => {
  it.each([
    { x: 100, y: 50, width: 1440, height: 900 },
    { x: 2000, y: 0, width: 1100, height: 800 },
    { x: -1000, y: 0, width: 1200, height: 800 },
  ])('is where it opens again: %j', (bounds) => {
    keepBounds(file, bounds);
    expect(lastBounds(file, screens)).toEqual(bounds);
  });

  it.each([
    ['on a screen that is gone', { x: 4000, y: 0, width: 1440, height: 900 }],
    ['with its title above the screen', { x: 0, y: -500, width: 1440, height: 900 }],
    ['below the screen', { x: 0, y: 1030, width: 1440, height: 900 }],
    ['but for a sliver', { x: -1390, y: 0, width: 1440, height: 900 }],
  ])('is forgotten when it was %s', (_, bounds) => {
    keepBounds(file, bounds);
    expect(lastBounds(file, screens)).toBeNull();
  });

  it.each(['', '{"x": 1', '[]', '{"x": "1", "y": 1, "width": 900, "height": 900}', 'null'])(
    'is not known from %j',
    (text) => {
      writeFileSync(file, text);
      expect(lastBounds(file, screens)).toBeNull();
    },
  );

  it('is not known, and not a failure, where nothing can be kept', () => {
    const nowhere = path.join(folder, 'gone/window.json');
    keepBounds(nowhere, { x: 0, y: 0, width: 1440, height: 900 });
    expect(lastBounds(nowhere, screens)).toBeNull();
  });
});
