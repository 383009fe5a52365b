import {
  addRun,
  removeAliquot,
  removeRun,
  type SheetAliquot,
  type SheetRun,
  speciesName,
  updateAliquot,
  updateRun,
} from '../../../analysis/index.ts';
import { Choice, Field } from '../../fields/field.tsx';
import { keptDilution, parseDilution, shownDilution } from '../../fields/parse-dilution.ts';
import {
  type Entry,
  parseNonNegative,
  parsePathLength,
  parsePercent,
  parsePositive,
  shown,
} from '../../fields/parse-entry.ts';
import { LoadLine } from '../../import/load-line.tsx';
import type { SectionProps } from '../section.ts';
import { sourceName } from '../standards/standards-section.tsx';

export function aliquotsSummary({ sheet }: SectionProps): string {
  const [aliquots, runs] = [sheet.aliquots?.length ?? 0, sheet.runs?.length ?? 0];
  return `${aliquots} ${aliquots === 1 ? 'aliquot' : 'aliquots'} of ${runs} ${runs === 1 ? 'run' : 'runs'}`;
}

export function aliquotsNeeds({ sheet }: SectionProps): string | null {
  return (sheet.aliquots ?? []).length === 0 ? 'the spectrum of a crude' : null;
}

const newRun = '\u0000new';
const orders = [
  { value: '', text: 'not said' },
  { value: 'arm-into-core', text: 'arm into core' },
  { value: 'core-into-arm', text: 'core into arm' },
  { value: 'together', text: 'together' },
];

export function AliquotsSection(props: SectionProps) {
  const { sheet, change } = props;
  const aliquots = sheet.aliquots ?? [];
  const runs = sheet.runs ?? [];
  if (aliquots.length === 0) {
    return (
      <div class="empty">
        <LoadLine destination="aliquots" what="the exports of the crude" />
        <p>
          One spectrum for each aliquot. Then say from which run it is and how far it was diluted.
        </p>
      </div>
    );
  }
  return (
    <>
      <table class="ledger">
        <thead>
          <tr>
            <th scope="col">Aliquot</th>
            <th scope="col">of run</th>
            <th scope="col" class="number">
              path, cm
            </th>
            <th scope="col" class="number" title="A factor, or steps in mL: 1 → 100; 5 → 50">
              dilution
            </th>
            <th scope="col" class="number" title="Relative standard uncertainty of the dilution">
              u, %
            </th>
            <th scope="col">
              <span class="unseen">Remove</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {aliquots.map((aliquot) => (
            <AliquotRow key={aliquot.id} {...props} entry={aliquot} />
          ))}
        </tbody>
      </table>
      <LoadLine destination="aliquots" what="more exports of the crude" />
      {runs.length > 0 && <RunsTable {...props} runs={runs} />}
      <button
        type="button"
        class="quiet"
        onClick={() => change('add run', (before) => addRun(before))}
      >
        Add a run
      </button>
    </>
  );
}

function AliquotRow({
  sheet,
  change,
  entry: aliquot,
}: SectionProps & { readonly entry: SheetAliquot }) {
  const { id, run, dilution, pathLengthCm, spectrum } = aliquot;
  const set = (label: string, changes: Parameters<typeof updateAliquot>[2]): void =>
    change(label, (before) => updateAliquot(before, id, changes));
  const name = spectrum.embedded?.name ?? spectrum.file ?? id;
  const source = sourceName(spectrum.embedded?.source?.file, name);
  return (
    <tr>
      <td>
        {id}{' '}
        <span class="soft source" title={source}>
          {source}
        </span>
      </td>
      <td>
        <Choice
          label={`Run of ${id}`}
          value={run ?? ''}
          options={[
            { value: '', text: '—' },
            ...(sheet.runs ?? []).map((each) => ({ value: each.id, text: each.name || each.id })),
            { value: newRun, text: 'a new run' },
          ]}
          choose={(next) => {
            if (next === newRun) change('add run', (before) => addRun(before, id));
            else set('set run', { run: next === '' ? undefined : next });
          }}
        />
      </td>
      <td class="number">
        <Field
          label={`Path length of ${id} in cm`}
          align="right"
          placeholder="1"
          value={shown(pathLengthCm)}
          commit={committed(parsePathLength, (value) =>
            set('set path length', { pathLengthCm: value }),
          )}
        />
      </td>
      <td class="number">
        <Field
          label={`Dilution of ${id}`}
          align="right"
          placeholder="none"
          title="A factor (2000 or 1:2000), or steps in mL (1 → 100; 5 → 50)"
          value={shownDilution(dilution)}
          commit={(text) => {
            const entry = parseDilution(text);
            if (!entry.ok) return entry.message;
            set('set dilution', { dilution: keptDilution(dilution, entry.value) });
            return null;
          }}
        />
      </td>
      <td class="number">
        <Field
          label={`Relative standard uncertainty of the dilution of ${id} in %`}
          align="right"
          placeholder={dilution ? 'not given' : '–'}
          value={shown(dilution?.relativeStandardUncertainty, 100)}
          commit={(text) => {
            const entry = parsePercent(text);
            if (!entry.ok) return entry.message;
            if (!dilution) return 'Type the dilution first.';
            const { relativeStandardUncertainty: _, ...rest } = dilution;
            const given =
              entry.value === undefined ? {} : { relativeStandardUncertainty: entry.value };
            set('set dilution uncertainty', { dilution: { ...rest, ...given } });
            return null;
          }}
        />
      </td>
      <td>
        <button
          type="button"
          class="remove"
          aria-label={`Remove aliquot ${id}`}
          onClick={() => change(`remove aliquot ${id}`, (before) => removeAliquot(before, id))}
        >
          ×
        </button>
      </td>
    </tr>
  );
}

function RunsTable({ sheet, change, runs }: SectionProps & { readonly runs: readonly SheetRun[] }) {
  const { core, arm } = sheet.reaction;
  return (
    <table class="ledger">
      <caption>Runs: how each was done</caption>
      <thead>
        <tr>
          <th scope="col">Run</th>
          <th scope="col">order of addition</th>
          <th scope="col" class="number">
            {speciesName(sheet, core)}, mmol
          </th>
          <th scope="col" class="number">
            {speciesName(sheet, arm)}, mmol
          </th>
          <th scope="col" class="number">
            volume, mL
          </th>
          <th scope="col" class="number">
            addition, min
          </th>
          <th scope="col">
            <span class="unseen">Remove</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {runs.map((run) => {
          const { id, name = '', order, chargedMol = {}, volumeL, additionTimeMin } = run;
          const called = name || id;
          const set = (label: string, changes: Parameters<typeof updateRun>[2]): void =>
            change(label, (before) => updateRun(before, id, changes));
          const setCharge = (species: string) => (value: number | undefined) => {
            const { [species]: _, ...rest } = chargedMol;
            set('set charge', {
              chargedMol: value === undefined ? rest : { ...rest, [species]: value / 1000 },
            });
          };
          return (
            <tr key={id}>
              <td class="wide">
                <Field
                  label={`Name of run ${id}`}
                  value={name}
                  placeholder={id}
                  commit={(text) => {
                    set('name run', { name: text.trim() });
                    return null;
                  }}
                />
              </td>
              <td>
                <Choice
                  label={`Order of addition of ${called}`}
                  value={order ?? ''}
                  options={orders}
                  choose={(next) => set('set order', { order: orderOf(next) })}
                />
              </td>
              {[core, arm].map((species) => (
                <td class="number" key={species}>
                  <Field
                    label={`${speciesName(sheet, species)} charged in ${called}, mmol`}
                    align="right"
                    placeholder="–"
                    value={shown(chargedMol[species], 1000)}
                    commit={committed(parsePositive, setCharge(species))}
                  />
                </td>
              ))}
              <td class="number">
                <Field
                  label={`Volume of ${called} in mL`}
                  align="right"
                  placeholder="–"
                  value={shown(volumeL, 1000)}
                  commit={committed(parsePositive, (value) =>
                    set('set volume', { volumeL: value === undefined ? undefined : value / 1000 }),
                  )}
                />
              </td>
              <td class="number">
                <Field
                  label={`Time of addition of ${called} in min`}
                  align="right"
                  placeholder="–"
                  value={shown(additionTimeMin)}
                  commit={committed(parseNonNegative, (value) =>
                    set('set addition time', { additionTimeMin: value }),
                  )}
                />
              </td>
              <td>
                <button
                  type="button"
                  class="remove"
                  aria-label={`Remove run ${called}`}
                  onClick={() => change(`remove run ${called}`, (before) => removeRun(before, id))}
                >
                  ×
                </button>
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

function orderOf(value: string): SheetRun['order'] | undefined {
  return value === 'arm-into-core' || value === 'core-into-arm' || value === 'together'
    ? value
    : undefined;
}

/** A commit that parses, then hands the number on. */
function committed(
  parse: (text: string) => Entry,
  take: (value: number | undefined) => void,
): (text: string) => string | null {
  return (text) => {
    const entry = parse(text);
    if (!entry.ok) return entry.message;
    take(entry.value);
    return null;
  };
}
