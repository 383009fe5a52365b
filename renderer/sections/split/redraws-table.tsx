import {
  type Quantified,
  quantifiedText,
  type RedrawCheck,
  type RedrawnQuantity,
  type Sheet,
  speciesLabel,
} from '../../../analysis/index.ts';
import { drawsText } from './redraws-text.ts';

interface RedrawsTableProps {
  readonly sheet: Sheet;
  readonly check: RedrawCheck;
  readonly isStale: boolean;
}

const units = {
  fraction: { unit: 'percent', name: 'of products, %' },
  ratio: { unit: 'plain', name: 'ratio' },
  cuvette: { unit: 'micromolar', name: 'cuvette, µmol/L' },
  flask: { unit: 'millimolar', name: 'flask, mmol/L' },
} as const;

const verdicts = {
  agree: 'agree',
  differ: 'differ',
  'near-bound': 'near a bound',
  unbounded: 'not bounded',
};

/** Quantity by quantity: the interval by the fit beside the one by redraws. */
export function RedrawsTable({ sheet, check, isStale }: RedrawsTableProps) {
  return (
    <table class="ledger redraws-table" data-stale={isStale || undefined}>
      <caption>
        Aliquot {check.aliquot}, {drawsText(check.draws)}, 95 % intervals. ± is the Monte Carlo
        standard error of the ends.
      </caption>
      <thead>
        <tr>
          <th scope="col">Quantity</th>
          <th scope="col" class="interval">
            by the fit
          </th>
          <th scope="col" class="interval">
            by redraws
          </th>
          <th scope="col" class="number">
            ±
          </th>
          <th scope="col">Comparison</th>
        </tr>
      </thead>
      <tbody>
        {check.quantities.map((quantity) => (
          <Row
            key={`${quantity.kind} ${quantity.species} ${quantity.to ?? ''}`}
            sheet={sheet}
            quantity={quantity}
          />
        ))}
      </tbody>
    </table>
  );
}

function Row({ sheet, quantity }: { readonly sheet: Sheet; readonly quantity: RedrawnQuantity }) {
  const { kind, species, to, byFit, byRedraws, comparison } = quantity;
  const { unit, name } = units[kind];
  const { interval } = comparison;
  const finite = (value: number): number | null => (Number.isFinite(value) ? value : null);
  const redrawn: Quantified = {
    value: finite(byRedraws.mean),
    standardUncertainty: finite(byRedraws.standardDeviation),
    interval95: [finite(interval.low), finite(interval.high)],
  };
  const error = finite(Math.max(interval.lowError, interval.highError));
  const label = speciesLabel(sheet, species);
  return (
    <tr>
      <th scope="row">
        {to === null ? label : `${label} : ${speciesLabel(sheet, to)}`}, {name}
      </th>
      <td class="interval">{quantifiedText(byFit, { unit }).interval}</td>
      <td class="interval">{quantifiedText(redrawn, { unit }).interval}</td>
      <td class="number">{errorText(error, redrawn, unit)}</td>
      <td>{verdicts[comparison.verdict]}</td>
    </tr>
  );
}

/** With the decimals of the interval it belongs to. */
function errorText(
  error: number | null,
  { standardUncertainty }: Quantified,
  unit: (typeof units)[keyof typeof units]['unit'],
): string {
  const asQuantity = { value: error, standardUncertainty, interval95: [null, null] } as const;
  return quantifiedText(asQuantity, { unit }).value;
}
