import { useEffect, useRef, useState } from 'preact/hooks';
import { platform } from '../platform/this-platform.ts';
import {
  fileName,
  isOpen,
  isUnsaved,
  isWorking,
  redoLabel,
  sheet,
  undoLabel,
} from '../state/store.ts';
import { run } from './actions.ts';
import { Notices } from './notices.tsx';

/** Title and what can be done with the sheet as a whole. */
export function Header() {
  const undo = undoLabel.value;
  const redo = redoLabel.value;
  return (
    <header>
      <div class="page-header">
        <div class="page-title">
          <p class="wordmark">Monobis</p>
          {isOpen.value && (
            <p class="soft" role="status">
              {fileName.value ?? 'not saved yet'}
              {isUnsaved.value && fileName.value !== null && ', changed'}
              {isWorking.value && ' · computing …'}
            </p>
          )}
        </div>
        <div class="page-actions">
          <button type="button" onClick={() => run('new-sheet')}>
            New sheet
          </button>
          <button type="button" onClick={() => run('open-sheet')}>
            Open…
          </button>
          {isOpen.value && (
            <>
              <button type="button" onClick={() => run('save')} title="Ctrl+S">
                Save
              </button>
              <button type="button" onClick={() => run('save-as')} title="Ctrl+Shift+S">
                Save as…
              </button>
              <button type="button" onClick={() => run('add-exports')}>
                Add exports…
              </button>
              <ExportMenu />
              <button
                type="button"
                disabled={undo === null}
                title={undo === null ? 'Nothing to undo' : `Undo: ${undo}`}
                onClick={() => run('undo')}
              >
                Undo
              </button>
              <button
                type="button"
                disabled={redo === null}
                title={redo === null ? 'Nothing to redo' : `Redo: ${redo}`}
                onClick={() => run('redo')}
              >
                Redo
              </button>
            </>
          )}
          <button type="button" onClick={() => run('open-sample')}>
            Open the sample sheet
          </button>
        </div>
      </div>
      {isOpen.value && sheet.value.invented === true && (
        <p class="invented">Invented data, for demonstration: not the spectra of real compounds.</p>
      )}
      <Notices />
    </header>
  );
}

const exportsOffered = [
  ['export-csv', 'Results as CSV'],
  ['export-html', 'Report as HTML'],
  ['export-pdf', platform.kind === 'desktop' ? 'Report as PDF' : 'Report to print or PDF'],
] as const;

function ExportMenu() {
  const [isShown, setShown] = useState(false);
  const place = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (!isShown) return;
    const away = (event: Event): void => {
      if (!(event.target instanceof Node && place.current?.contains(event.target))) setShown(false);
    };
    const escaped = (event: KeyboardEvent): void => {
      if (event.key === 'Escape') setShown(false);
    };
    document.addEventListener('keydown', escaped);
    document.addEventListener('pointerdown', away);
    document.addEventListener('focusin', away);
    return () => {
      document.removeEventListener('keydown', escaped);
      document.removeEventListener('pointerdown', away);
      document.removeEventListener('focusin', away);
    };
  }, [isShown]);
  return (
    <div class="export-menu" ref={place}>
      <button type="button" aria-expanded={isShown} onClick={() => setShown(!isShown)}>
        Export
      </button>
      {isShown && (
        <ul>
          {exportsOffered.map(([command, text]) => (
            <li key={command}>
              <button
                type="button"
                onClick={() => {
                  setShown(false);
                  run(command);
                }}
              >
                {text}
              </button>
            </li>
          ))}
        </ul>
      )}
    </div>
  );
}
