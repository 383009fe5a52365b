import { type Sheet, type SplitFraction, speciesLabel } from '../../../analysis/index.ts';
import { lookClass } from '../../species/species-glyph.tsx';
import { shareText } from './share-text.ts';
import './split-bar.css';

interface SplitBarProps {
  readonly sheet: Sheet;
  readonly split: readonly SplitFraction[];
}

/** The split as a bar, with the name and share of each part under it, in the same order. */
export function SplitBar({ sheet, split }: SplitBarProps) {
  return (
    <div>
      <div class="split-bar" aria-hidden="true">
        {split.map(({ species, fraction }) => (
          <div
            key={species}
            class={`split-part ${lookClass(sheet, species)}`}
            style={{ flexGrow: Math.max(fraction.value ?? 0, 0.0001) }}
          >
            <span class="split-fill" />
          </div>
        ))}
      </div>
      <ul class="split-shares">
        {split.map(({ species, fraction }) => (
          <li key={species} class={`split-share ${lookClass(sheet, species)}`}>
            <span class="split-fill" />
            {speciesLabel(sheet, species)} {shareText(fraction)}
          </li>
        ))}
      </ul>
    </div>
  );
}
