import { useEffect, useState } from 'preact/hooks';
import { clearKept, type Kept, keptSheet } from '../state/keep.ts';
import { tellFault } from '../state/notices.ts';
import { replaceSheet } from '../state/store.ts';
import { run } from './actions.ts';

/** Nothing is open yet: three ways to begin, and what was not saved last time. */
export function Empty() {
  return (
    <div class="beginning">
      <KeptOffer />
      <h2>From the spectrum of a crude to the mono : bis ratio</h2>
      <p>
        One sheet holds the reaction, the standards, the aliquots and the answer, read from top to
        bottom. Begin where you like:
      </p>
      <ul>
        <li>
          <button type="button" onClick={() => run('open-sample')}>
            Open the sample sheet
          </button>
          <span>an invented reaction, complete, to look at and to change</span>
        </li>
        <li>
          <button type="button" onClick={() => run('new-sheet')}>
            Begin a new sheet
          </button>
          <span>name the reaction, then load standards and crude spectra</span>
        </li>
        <li>
          <button type="button" onClick={() => run('open-sheet')}>
            Open a sheet
          </button>
          <span>one that was saved here, or that a colleague sent</span>
        </li>
      </ul>
      <p class="drop-here">
        Drop exports here: text files as spectrometers write them, several at once, or a saved
        sheet.
      </p>
    </div>
  );
}

function KeptOffer() {
  const [kept, setKept] = useState<Kept | null>(null);
  useEffect(() => {
    keptSheet().then(setKept, tellFault);
  }, []);
  if (!kept) return null;
  const { sheet, name, at } = kept;
  const when = at === '' ? '' : ` of ${new Date(at).toLocaleString()}`;
  return (
    <div class="notice" role="status">
      <p>
        A sheet{when} was not saved: {sheet.title || name || 'untitled'}.
      </p>
      <div class="dialog-answers">
        <button
          type="button"
          onClick={() => replaceSheet(sheet, { name, handle: null, isSaved: false })}
        >
          Take it up again
        </button>
        <button
          type="button"
          class="quiet"
          onClick={() => {
            setKept(null);
            clearKept().catch(tellFault);
          }}
        >
          Discard it
        </button>
      </div>
    </div>
  );
}
