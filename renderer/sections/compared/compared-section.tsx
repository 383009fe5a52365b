import { quantifiedText, speciesLabel } from '../../../analysis/index.ts';
import type { SectionProps } from '../section.ts';

export function comparedSummary({ quantification }: SectionProps): string {
  const count = quantification?.results.comparisons.length ?? 0;
  return `${count} ${count === 1 ? 'comparison' : 'comparisons'}`;
}

/** Ratio of the ratios of every two runs; errors that both share cancel in it. */
export function ComparedSection({ sheet, quantification }: SectionProps) {
  const comparisons = quantification?.results.comparisons ?? [];
  const runName = (id: string): string => sheet.runs?.find((run) => run.id === id)?.name || id;
  return (
    <table class="ledger">
      <thead>
        <tr>
          <th scope="col">Run over run</th>
          <th scope="col">ratio</th>
          <th scope="col" class="number">
            ratio of ratios
          </th>
          <th scope="col" class="interval">
            95 %
          </th>
          <th scope="col" class="number">
            p-value
          </th>
        </tr>
      </thead>
      <tbody>
        {comparisons.map(({ runs, of, to, ratioOfRatios, pValue }) => {
          const { value, interval } = quantifiedText(ratioOfRatios, { unit: 'plain' });
          return (
            <tr key={`${runs.join()} ${of} ${to}`}>
              <th scope="row">
                {runName(runs[0])} over {runName(runs[1])}
              </th>
              <td>
                {speciesLabel(sheet, of)} : {speciesLabel(sheet, to)}
              </td>
              <td class="number">{value}</td>
              <td class="interval">{interval}</td>
              <td class="number">{pValueText(pValue)}</td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

function pValueText(pValue: number | null): string {
  if (pValue === null) return '—';
  return pValue < 1e-4 ? 'below 0.0001' : pValue.toPrecision(2);
}
