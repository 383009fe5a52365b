import { signal } from '@preact/signals';
import { type Destination, isDestination } from '../import/imports.ts';
import { openedAll, sheetSource } from '../platform/browser.ts';
import { attempt, notify } from '../state/notices.ts';
import { isOpen, sheetsShown } from '../state/store.ts';
import { actions, openInstead, takeIn } from './actions.ts';

/** True while files hang over the page. */
export const isDragging = signal(false);

/** Files may be dropped anywhere; where they fall says what they are. */
export function startTakingDrops(): void {
  let leaving: ReturnType<typeof setTimeout> | undefined;
  window.addEventListener('dragover', (event) => {
    if (!event.dataTransfer?.types.includes('Files')) return;
    event.preventDefault();
    event.dataTransfer.dropEffect = 'copy';
    isDragging.value = true;
    clearTimeout(leaving);
    // no event says for sure that a drag has left the window
    leaving = setTimeout(() => {
      isDragging.value = false;
    }, 300);
  });
  window.addEventListener('drop', (event) => {
    event.preventDefault();
    isDragging.value = false;
    const files = [...(event.dataTransfer?.files ?? [])];
    const section = event.target instanceof Element ? event.target.closest('[data-takes]') : null;
    const takes = section?.getAttribute('data-takes');
    const destination = isDestination(takes) ? takes : null;
    void attempt(() => dropped(files, destination));
  });
}

async function dropped(files: readonly File[], destination: Destination | null): Promise<void> {
  const sheetFile = files.find(({ name }) => name.toLowerCase().endsWith('.json'));
  const rest = files.filter((file) => file !== sheetFile);
  if (sheetFile) {
    if (!(await openInstead(await sheetSource(sheetFile)))) {
      // what came with a sheet that was not wanted does not belong in the one that stays
      if (rest.length > 0)
        notify(
          'news',
          'The sheet was not opened, and the files dropped with it were left out:',
          rest.map(({ name }) => name),
        );
      return;
    }
  } else if (!isOpen.value) await actions['new-sheet']();
  const shown = sheetsShown.peek();
  const { files: exports, unreadable } = await openedAll(rest);
  if (unreadable.length > 0) {
    notify(
      'refusal',
      'These could not be read; a folder cannot be dropped, only the files in it:',
      unreadable,
    );
  }
  await takeIn(exports, destination, shown);
}
