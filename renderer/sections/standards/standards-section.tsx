import {
  absorbingSpecies,
  addStockFor,
  removeStandard,
  type SheetStandard,
  speciesName,
  updateStandard,
} from '../../../analysis/index.ts';
import { Choice } from '../../fields/field.tsx';
import { NumberField } from '../../fields/number-field.tsx';
import { parseConcentration, parsePathLength, parsePercent } from '../../fields/parse-entry.ts';
import { RemoveButton } from '../../fields/remove-button.tsx';
import { LoadLine } from '../../import/load-line.tsx';
import { StandardsPlot } from '../../plots/standards-plot.tsx';
import { SpeciesGlyph } from '../../species/species-glyph.tsx';
import type { SectionProps } from '../section.ts';
import { sourceName } from '../source-name.ts';
import { AgreementTable } from './agreement-table.tsx';
import { StocksTable } from './stocks-table.tsx';

export function standardsSummary({ sheet }: SectionProps): string {
  const standards = sheet.standards ?? [];
  const species = new Set(standards.map((standard) => standard.species));
  return `${standards.length} standards of ${species.size} species`;
}

export function standardsNeeds({ sheet }: SectionProps): string | null {
  const standards = sheet.standards ?? [];
  const missing = absorbingSpecies(sheet).filter(
    ({ id }) => !standards.some(({ species }) => species === id),
  );
  if (missing.length > 0)
    return `a standard of ${missing.map(({ id }) => speciesName(sheet, id)).join(', ')}`;
  const open = standards.filter(
    ({ kind, concentrationMolPerL }) =>
      kind !== 'molar-absorptivity' && concentrationMolPerL === undefined,
  );
  return open.length > 0 ? `the concentration of ${open.map(({ id }) => id).join(', ')}` : null;
}

const newStock = '\u0000new';

export function StandardsSection(props: SectionProps) {
  const { sheet, quantification } = props;
  const standards = sheet.standards ?? [];
  const stocks = sheet.stocks ?? [];
  if (standards.length === 0) {
    return (
      <div class="empty">
        <LoadLine destination="standards" what="the exports of the pure standards" />
        <p>
          Each trace becomes one line; then say of which species it is and type its concentration.
        </p>
      </div>
    );
  }
  return (
    <>
      <table class="ledger">
        <thead>
          <tr>
            <th scope="col">Standard</th>
            <th scope="col">of</th>
            <th scope="col">from stock</th>
            <th scope="col" class="number">
              concentration, µmol/L
            </th>
            <th
              scope="col"
              class="number"
              title="Relative standard uncertainty of this solution alone"
            >
              u, %
            </th>
            <th scope="col" class="number">
              path, cm
            </th>
            <th scope="col">
              <span class="unseen">Remove</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {standards.map((standard) => (
            <StandardRow key={standard.id} {...props} standard={standard} />
          ))}
        </tbody>
      </table>
      <LoadLine destination="standards" what="more exports of standards" />
      {stocks.length > 0 && <StocksTable {...props} stocks={stocks} />}
      {quantification && quantification.standards.length > 0 && (
        <>
          <StandardsPlot standards={quantification.standards} sheet={sheet} />
          <AgreementTable standards={quantification.standards} sheet={sheet} />
        </>
      )}
    </>
  );
}

function StandardRow({
  sheet,
  change,
  standard,
}: SectionProps & { readonly standard: SheetStandard }) {
  const { id, species, stock, spectrum, kind } = standard;
  const isEpsilon = kind === 'molar-absorptivity';
  const set = (label: string, changes: Parameters<typeof updateStandard>[2]): void =>
    change(label, (before) => updateStandard(before, id, changes));
  const name = spectrum.embedded?.name ?? spectrum.file ?? id;
  const source = sourceName(spectrum.embedded?.source?.file, name);
  const stocks = (sheet.stocks ?? []).filter((each) => each.species === species);
  return (
    <tr>
      <td>
        <span class="with-glyph">
          <SpeciesGlyph sheet={sheet} id={species} />
          <span>
            {id}{' '}
            <span class="soft source" title={source}>
              {source}
            </span>
          </span>
        </span>
      </td>
      <td>
        <Choice
          label={`Species of ${id}`}
          value={species}
          options={sheet.species.map((each) => ({ value: each.id, text: each.name || each.id }))}
          choose={(next) => set('set species of standard', { species: next })}
        />
      </td>
      <td>
        <Choice
          label={`Stock of ${id}`}
          value={stock ?? ''}
          options={[
            { value: '', text: '—' },
            ...stocks.map((each) => ({ value: each.id, text: each.id })),
            { value: newStock, text: 'a new stock' },
          ]}
          choose={(next) => {
            if (next === newStock) change('add stock', (before) => addStockFor(before, id));
            else set('set stock', { stock: next === '' ? undefined : next });
          }}
        />
      </td>
      <td class="number">
        {isEpsilon ? (
          <span class="soft">already ε</span>
        ) : (
          <NumberField
            label={`Concentration of ${id}`}
            value={standard.concentrationMolPerL}
            factor={1e6}
            placeholder="needed"
            title="A bare number is in µmol/L; or type a unit: 25 µM, 2.5e-5 M"
            isNeeded
            parse={parseConcentration}
            take={(value) => set('set concentration', { concentrationMolPerL: value })}
          />
        )}
      </td>
      <td class="number">
        <NumberField
          label={`Relative standard uncertainty of ${id} in %`}
          value={standard.relativeStandardUncertainty}
          factor={100}
          placeholder="not given"
          parse={parsePercent}
          take={(value) => set('set uncertainty', { relativeStandardUncertainty: value })}
        />
      </td>
      <td class="number">
        <NumberField
          label={`Path length of ${id} in cm`}
          value={standard.pathLengthCm}
          placeholder="1"
          parse={parsePathLength}
          take={(value) => set('set path length', { pathLengthCm: value })}
        />
      </td>
      <td>
        <RemoveButton
          what={`standard ${id}`}
          remove={() => change(`remove standard ${id}`, (before) => removeStandard(before, id))}
        />
      </td>
    </tr>
  );
}
