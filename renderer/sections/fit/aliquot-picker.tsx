import { Choice } from '../../fields/field.tsx';
import type { SectionProps } from '../section.ts';

/** Chooses the aliquot that Fit and Split point at. */
export function AliquotPicker({
  sheet,
  aliquot,
  chooseAliquot,
}: Pick<SectionProps, 'sheet' | 'aliquot' | 'chooseAliquot'>) {
  const aliquots = sheet.aliquots ?? [];
  const at = aliquots.findIndex(({ id }) => id === aliquot);
  const step = (by: number): void => {
    const next = aliquots[at + by];
    if (next) chooseAliquot(next.id);
  };
  return (
    <div class="picker">
      <button
        type="button"
        class="quiet"
        disabled={at <= 0}
        aria-label="Previous aliquot"
        onClick={() => step(-1)}
      >
        Previous
      </button>
      <Choice
        label="Aliquot shown"
        value={aliquot ?? ''}
        options={aliquots.map(({ id, run }) => ({
          value: id,
          text: run === undefined ? id : `${id}, run ${run}`,
        }))}
        choose={chooseAliquot}
      />
      <button
        type="button"
        class="quiet"
        disabled={at >= aliquots.length - 1}
        aria-label="Next aliquot"
        onClick={() => step(1)}
      >
        Next
      </button>
    </div>
  );
}
