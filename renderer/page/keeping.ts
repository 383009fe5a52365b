import { startKeeping } from '../state/keep.ts';
import { browserStore } from '../state/kept-store.ts';
import { holdPageLock, pageName } from '../state/living-pages.ts';
import { notify } from '../state/notices.ts';

holdPageLock();

/** This page's sheet is kept from the first change on. */
export const keeping = startKeeping(pageName, browserStore, (error) =>
  notify(
    'refusal',
    'This browser does not let the sheet be kept between saves (private windows and full disks do that). Save often: after a crash it could not be offered back.',
    [String(error)],
  ),
);
window.addEventListener('pagehide', () => void keeping.keepNow());
