import { useEffect, useState } from 'preact/hooks';
import { type Kept, leftBehind } from '../state/keep.ts';
import { browserStore } from '../state/kept-store.ts';
import { livingPages } from '../state/living-pages.ts';
import { attempt, tellFault } from '../state/notices.ts';
import { replaceSheet } from '../state/store.ts';
import { run } from './actions.ts';
import { keeping } from './keeping.ts';

/** Nothing is open yet: three ways to begin, and what was not saved last time. */
export function Empty() {
  return (
    <div class="beginning">
      <KeptOffers />
      <h1>From the spectrum of a crude to the mono : bis ratio</h1>
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

/** A page that was just closed may hold its lock a moment longer. */
const looksAtMs = [0, 600, 2500];

/** What was not saved when its page came to its end: each to be taken up again or discarded. */
function KeptOffers() {
  const [offers, setOffers] = useState<readonly Kept[]>([]);
  useEffect(() => {
    const look = async (): Promise<void> =>
      setOffers(await leftBehind(browserStore, await livingPages()));
    const timers = looksAtMs.map((ms) => setTimeout(() => look().catch(tellFault), ms));
    return () => timers.forEach(clearTimeout);
  }, []);
  const remove = async ({ page }: Kept): Promise<void> => {
    await browserStore.remove(page);
    setOffers((before) => before.filter((offer) => offer.page !== page));
  };
  return (
    <>
      {offers.map((offer) => (
        <div class="notice" role="status" key={offer.page}>
          <p>
            A sheet{offer.at === '' ? '' : ` of ${new Date(offer.at).toLocaleString()}`} was not
            saved: {offer.sheet.title || offer.name || 'untitled'}.
          </p>
          <div class="dialog-answers">
            <button type="button" onClick={() => void attempt(() => takeUp(offer))}>
              Take it up again
            </button>
            <button type="button" class="quiet" onClick={() => void attempt(() => remove(offer))}>
              Discard it
            </button>
          </div>
        </div>
      ))}
    </>
  );
}

/** It is this page's from now on, and kept as such before the old keep goes. */
async function takeUp({ page, sheet, name }: Kept): Promise<void> {
  replaceSheet(sheet, { name, handle: null, isSaved: false });
  await keeping.keepNow();
  await browserStore.remove(page);
}
