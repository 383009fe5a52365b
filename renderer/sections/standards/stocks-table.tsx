import { removeStock, type Sheet, speciesName, updateStock } from '../../../analysis/index.ts';
import { Field } from '../../fields/field.tsx';
import { parsePercent, shown } from '../../fields/parse-entry.ts';
import type { SectionProps } from '../section.ts';

type StocksTableProps = Pick<SectionProps, 'sheet' | 'change'> & {
  readonly stocks: NonNullable<Sheet['stocks']>;
};

export function StocksTable({ sheet, change, stocks }: StocksTableProps) {
  return (
    <table class="ledger narrow">
      <caption>Stocks: an error common to all standards made from one</caption>
      <thead>
        <tr>
          <th scope="col">Stock</th>
          <th scope="col">of</th>
          <th scope="col" class="number">
            u, %
          </th>
          <th scope="col">
            <span class="unseen">Remove</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {stocks.map(({ id, species, relativeStandardUncertainty }) => (
          <tr key={id}>
            <td>{id}</td>
            <td>{speciesName(sheet, species)}</td>
            <td class="number">
              <Field
                label={`Relative standard uncertainty of stock ${id} in %`}
                align="right"
                value={shown(relativeStandardUncertainty, 100)}
                placeholder="not given"
                commit={(text) => {
                  const entry = parsePercent(text);
                  if (!entry.ok) return entry.message;
                  const { value } = entry;
                  change('set stock uncertainty', (before) =>
                    updateStock(before, id, { relativeStandardUncertainty: value }),
                  );
                  return null;
                }}
              />
            </td>
            <td>
              <button
                type="button"
                class="remove"
                aria-label={`Remove stock ${id}`}
                onClick={() => change(`remove stock ${id}`, (before) => removeStock(before, id))}
              >
                ×
              </button>
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
