import { platform } from '../platform/this-platform.ts';
import { attempt } from '../state/notices.ts';
import { sheetsShown } from '../state/store.ts';
import { addExports, type Destination } from './imports.ts';

interface LoadLineProps {
  readonly destination: Destination;
  /** "the exports of the pure standards" */
  readonly what: string;
}

/** Says that exports may be dropped here, and lets them be chosen. */
export function LoadLine({ destination, what }: LoadLineProps) {
  return (
    <p class="load-line">
      Drop {what} here, or{' '}
      <button
        type="button"
        class="quiet inline"
        onClick={() =>
          void attempt(async () => {
            const shown = sheetsShown.peek();
            await addExports(await platform.openExports(), destination, shown);
          })
        }
      >
        choose files
      </button>
    </p>
  );
}
