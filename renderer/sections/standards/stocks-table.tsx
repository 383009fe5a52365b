import { removeStock, type Sheet, speciesName, updateStock } from '../../../analysis/index.ts';
import { NumberField } from '../../fields/number-field.tsx';
import { parsePercent } from '../../fields/parse-entry.ts';
import { RemoveButton } from '../../fields/remove-button.tsx';
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
              <NumberField
                label={`Relative standard uncertainty of stock ${id} in %`}
                value={relativeStandardUncertainty}
                factor={100}
                placeholder="not given"
                parse={parsePercent}
                take={(value) =>
                  change('set stock uncertainty', (before) =>
                    updateStock(before, id, { relativeStandardUncertainty: value }),
                  )
                }
              />
            </td>
            <td>
              <RemoveButton
                what={`stock ${id}`}
                remove={() => change(`remove stock ${id}`, (before) => removeStock(before, id))}
              />
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
