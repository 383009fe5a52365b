import type { MenuCommand } from '../../main/desktop/channels.ts';
import { platform } from '../platform/this-platform.ts';
import { run } from './actions.ts';

/** The keys in a browser; in the desktop shell the native menu has them. */
export function startKeys(): void {
  if (platform.kind === 'desktop') return;
  window.addEventListener('keydown', (event) => {
    if (!(event.ctrlKey || event.metaKey) || event.altKey) return;
    const command = commandOf(event.key.toLowerCase(), event.shiftKey, event.target);
    if (command === null) return;
    event.preventDefault();
    // a cell that is being typed in takes effect before it is saved
    if (document.activeElement instanceof HTMLElement) document.activeElement.blur();
    run(command);
  });
}

function commandOf(
  key: string,
  isShifted: boolean,
  target: EventTarget | null,
): MenuCommand | null {
  if (key === 's') return isShifted ? 'save-as' : 'save';
  if (key === 'o' && !isShifted) return 'open-sheet';
  // in a cell, undo belongs to the typing
  const isTyping = target instanceof HTMLInputElement && target.type === 'text';
  if (key === 'z' && !isTyping) return isShifted ? 'redo' : 'undo';
  if (key === 'y' && !isTyping) return 'redo';
  return null;
}
