import { readFileSync, writeFileSync } from 'node:fs';
import type { Rectangle } from 'electron';
import * as v from 'valibot';

const bounds = v.object({
  x: v.pipe(v.number(), v.integer()),
  y: v.pipe(v.number(), v.integer()),
  width: v.pipe(v.number(), v.integer(), v.minValue(300)),
  height: v.pipe(v.number(), v.integer(), v.minValue(300)),
});

/** How much of a window's title must be on a screen for it to be seized and moved. */
const seizablePx = 100;

/**
 * Where the window stood when it was last closed, in `file`; null where that is not known or no
 * longer on a screen (`screens`: their work areas).
 */
export function lastBounds(file: string, screens: readonly Rectangle[]): Rectangle | null {
  try {
    const last = v.parse(bounds, JSON.parse(readFileSync(file, 'utf8')));
    return screens.some((screen) => isSeizable(last, screen)) ? last : null;
  } catch {
    // nothing kept, or not whole: the window opens where it does by default
    return null;
  }
}

function isSeizable(window: Rectangle, screen: Rectangle): boolean {
  const across =
    Math.min(window.x + window.width, screen.x + screen.width) - Math.max(window.x, screen.x);
  return (
    across >= seizablePx &&
    window.y >= screen.y &&
    window.y <= screen.y + screen.height - seizablePx
  );
}

export function keepBounds(file: string, window: Rectangle): void {
  try {
    writeFileSync(file, JSON.stringify(v.parse(bounds, window)));
  } catch {
    // not worth a word: the next start opens the window where it does by default
  }
}
