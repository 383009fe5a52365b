import {
  addRun,
  removeAliquot,
  type SheetAliquot,
  updateAliquot,
} from '../../../analysis/index.ts';
import { Choice, Field } from '../../fields/field.tsx';
import { NumberField } from '../../fields/number-field.tsx';
import { keptDilution, parseDilution, shownDilution } from '../../fields/parse-dilution.ts';
import { parsePathLength, parsePercent, shown } from '../../fields/parse-entry.ts';
import { RemoveButton } from '../../fields/remove-button.tsx';
import { LoadLine } from '../../import/load-line.tsx';
import type { SectionProps } from '../section.ts';
import { sourceName } from '../source-name.ts';
import { RunsTable } from './runs-table.tsx';

export function aliquotsSummary({ sheet }: SectionProps): string {
  const [aliquots, runs] = [sheet.aliquots?.length ?? 0, sheet.runs?.length ?? 0];
  return `${aliquots} ${aliquots === 1 ? 'aliquot' : 'aliquots'} of ${runs} ${runs === 1 ? 'run' : 'runs'}`;
}

export function aliquotsNeeds({ sheet }: SectionProps): string | null {
  return (sheet.aliquots ?? []).length === 0 ? 'the spectrum of a crude' : null;
}

const newRun = '\u0000new';

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
        <NumberField
          label={`Path length of ${id} in cm`}
          value={pathLengthCm}
          placeholder="1"
          parse={parsePathLength}
          take={(value) => set('set path length', { pathLengthCm: value })}
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
        <RemoveButton
          what={`aliquot ${id}`}
          remove={() => change(`remove aliquot ${id}`, (before) => removeAliquot(before, id))}
        />
      </td>
    </tr>
  );
}
