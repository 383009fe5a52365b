import { removeNoiseScans, type Sheet } from '../../../analysis/index.ts';
import { RemoveButton } from '../../fields/remove-button.tsx';
import { LoadLine } from '../../import/load-line.tsx';
import type { SectionProps } from '../section.ts';
import { scansText } from './scans-text.ts';

type Groups = NonNullable<Sheet['noiseScans']>;

/** Repeated scans of one cuvette, or blanks, from which the noise is taken; files can be dropped here. */
export function NoiseScans({ sheet, change }: Pick<SectionProps, 'sheet' | 'change'>) {
  const groups: Groups = sheet.noiseScans ?? [];
  return (
    <div class="noise-scans" data-takes="noise-scans">
      {groups.length > 0 && (
        <ul>
          {groups.map((group) => (
            <li key={group.id}>
              <span>{scansText(group)}</span>
              <RemoveButton
                what={`noise scans ${group.id}`}
                remove={() =>
                  change(`remove noise scans ${group.id}`, (before) =>
                    removeNoiseScans(before, group.id),
                  )
                }
              />
            </li>
          ))}
        </ul>
      )}
      {groups.length > 0 && sheet.fit?.noise && (
        <p class="soft">The noise typed above is used, not that of the scans.</p>
      )}
      <LoadLine
        destination="noise-scans"
        what={
          groups.length > 0
            ? 'scans of another cuvette'
            : 'repeated scans of a cuvette with a solution in it, or blanks,'
        }
      />
    </div>
  );
}
