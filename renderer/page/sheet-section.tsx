import type { ComponentChildren } from 'preact';
import { useState } from 'preact/hooks';
import type { Destination } from '../import/imports.ts';
import { sheet } from '../state/store.ts';
import { SafePart } from './safe-part.tsx';

interface SheetSectionProps {
  readonly id: string;
  readonly title: string;
  readonly summary: string;
  /** What is still needed; null when the section is complete. */
  readonly needs: string | null;
  /** Exports dropped on it go there. */
  readonly takes?: Destination;
  readonly children: ComponentChildren;
}

/** One section of the sheet; folds to a line that sums it up. */
export function SheetSection({ id, title, summary, needs, takes, children }: SheetSectionProps) {
  const [isFolded, setFolded] = useState(false);
  return (
    <section class="section" id={id} aria-labelledby={`${id}-title`} data-takes={takes}>
      <div class="section-head">
        <h2 id={`${id}-title`}>
          <button type="button" aria-expanded={!isFolded} onClick={() => setFolded(!isFolded)}>
            <span class="fold" aria-hidden="true" />
            {title}
          </button>
        </h2>
        {needs === null ? (
          <p class="section-summary">{summary}</p>
        ) : (
          <p class="section-needs">Still needs {needs}.</p>
        )}
      </div>
      {!isFolded && (
        <SafePart sheet={sheet.value}>
          <div class="section-body">{children}</div>
        </SafePart>
      )}
    </section>
  );
}
