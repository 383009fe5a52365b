import type { MenuCommand } from '../../main/desktop/channels.ts';
import { platform } from '../platform/this-platform.ts';
import { run } from './actions.ts';

/** The keys in a browser; in the desktop shell the native menu has them. */
export function startKeys(): void {
  if (platform.kind === 'desktop') return;
  window.addEventListener('keydown', (event) => {
    if (!(event.ctrlKey || event.metaKey) || event.altKey) return;
    const command = commandOf(event.key.toLowerCase(), event.shiftKey);
    if (command === null) return;
    event.preventDefault();
    run(command);
  });
}

function commandOf(key: string, isShifted: boolean): MenuCommand | null {
  if (key === 's') return isShifted ? 'save-as' : 'save';
  if (key === 'o' && !isShifted) return 'open-sheet';
  if (key === 'z') return isShifted ? 'redo' : 'undo';
  if (key === 'y') return 'redo';
  return null;
}
