import { removeRun, type SheetRun, speciesName, updateRun } from '../../../analysis/index.ts';
import { Choice, Field } from '../../fields/field.tsx';
import { NumberField } from '../../fields/number-field.tsx';
import { parseNonNegative, parsePositive } from '../../fields/parse-entry.ts';
import { RemoveButton } from '../../fields/remove-button.tsx';
import type { SectionProps } from '../section.ts';

const orders = [
  { value: '', text: 'not said' },
  { value: 'arm-into-core', text: 'arm into core' },
  { value: 'core-into-arm', text: 'core into arm' },
  { value: 'together', text: 'together' },
];

export function RunsTable({
  sheet,
  change,
  runs,
}: SectionProps & { readonly runs: readonly SheetRun[] }) {
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
                  <NumberField
                    label={`${speciesName(sheet, species)} charged in ${called}, mmol`}
                    value={chargedMol[species]}
                    factor={1000}
                    placeholder="–"
                    parse={parsePositive}
                    take={setCharge(species)}
                  />
                </td>
              ))}
              <td class="number">
                <NumberField
                  label={`Volume of ${called} in mL`}
                  value={volumeL}
                  factor={1000}
                  placeholder="–"
                  parse={parsePositive}
                  take={(value) =>
                    set('set volume', { volumeL: value === undefined ? undefined : value / 1000 })
                  }
                />
              </td>
              <td class="number">
                <NumberField
                  label={`Time of addition of ${called} in min`}
                  value={additionTimeMin}
                  placeholder="–"
                  parse={parseNonNegative}
                  take={(value) => set('set addition time', { additionTimeMin: value })}
                />
              </td>
              <td>
                <RemoveButton
                  what={`run ${called}`}
                  remove={() => change(`remove run ${called}`, (before) => removeRun(before, id))}
                />
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
