import { type AliquotResult, type SheetAliquot, speciesLabel } from '../../analysis/index.ts';
import { lookClass } from '../species/species-glyph.tsx';
import { chooseAliquot, quantification, sheet, aliquot as shown } from '../state/store.ts';

/** Runs and their aliquots, each with a small bar of its split; choosing one points Fit at it. */
export function Shelf() {
  const { runs = [], aliquots = [] } = sheet.value;
  const loose = aliquots.filter(({ run }) => run === undefined);
  const groups = [
    ...runs.map(({ id, name }) => ({
      id,
      title: name || id,
      aliquots: aliquots.filter(({ run }) => run === id),
    })),
    ...(loose.length > 0 ? [{ id: '', title: 'Without a run', aliquots: loose }] : []),
  ];
  return (
    <nav class="shelf" aria-label="Runs and aliquots">
      {groups.map((group) => (
        <div class="shelf-run" key={group.id}>
          <h2>{group.title}</h2>
          <ul>
            {group.aliquots.map((each) => (
              <ShelfAliquot key={each.id} aliquot={each} />
            ))}
          </ul>
        </div>
      ))}
      {groups.length === 0 && <p class="soft">Runs and their aliquots are listed here.</p>}
    </nav>
  );
}

function ShelfAliquot({ aliquot }: { readonly aliquot: SheetAliquot }) {
  const results = quantification.value?.results;
  const result = results?.aliquots.find((each) => each.aliquot === aliquot.id);
  const isRefused = results?.refused.some(({ what }) => what === `aliquot ${aliquot.id}`) ?? false;
  const doubts = result?.doubts.length ?? 0;
  const mark = isRefused
    ? 'refused'
    : doubts > 0
      ? `${doubts} ${doubts === 1 ? 'doubt' : 'doubts'}`
      : '';
  return (
    <li>
      <button
        type="button"
        class="shelf-aliquot"
        aria-current={shown.value === aliquot.id}
        onClick={() => chooseAliquot(aliquot.id)}
      >
        <span class="shelf-name">{aliquot.name || aliquot.id}</span>
        {mark !== '' && (
          <span class={`mark ${isRefused ? 'mark-refused' : 'mark-doubt'}`}>
            <span aria-hidden="true">{isRefused ? '✕' : '?'}</span>
            <span class="unseen">{mark}</span>
          </span>
        )}
        {result && <span class="unseen">{splitWords(result)}</span>}
        <span class="shelf-bar" aria-hidden="true">
          {result?.split.map(({ species, fraction }) => (
            <span
              key={species}
              class={lookClass(sheet.value, species)}
              style={{ flexGrow: Math.max(fraction.value ?? 0, 0.0001) }}
            />
          ))}
        </span>
      </button>
    </li>
  );
}

/** The bar in words. */
function splitWords({ split }: AliquotResult): string {
  return split
    .flatMap(({ species, fraction: { value } }) =>
      value === null ? [] : `${speciesLabel(sheet.value, species)} ${(100 * value).toFixed(0)} %`,
    )
    .join(', ');
}
