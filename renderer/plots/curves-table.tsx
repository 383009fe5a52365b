import { type AliquotCurves, numberText, type Sheet, speciesName } from '../../analysis/index.ts';
import { pointText } from './left-out.ts';
import { tableRows, thinningText } from './thinned.ts';

interface CurvesTableProps {
  readonly sheet: Sheet;
  readonly curves: AliquotCurves;
}

/** The numbers of the fit plot, thinned where there are many. */
export function CurvesTable({ sheet, curves }: CurvesTableProps) {
  const { wavelengthNm, measured, fitted, contributions, residual, use } = curves;
  const isFitted = contributions.length > 0;
  const rows = tableRows(wavelengthNm.length);
  const text = (value: number | undefined, decimals: number): string =>
    value === undefined || Number.isNaN(value) ? '' : numberText(value, decimals);
  return (
    <table class="ledger numbers">
      <caption>{thinningText(wavelengthNm.length)}; absorbance but for the residual</caption>
      <thead>
        <tr>
          <th scope="col">nm</th>
          <th scope="col">measured</th>
          {isFitted && <th scope="col">fitted</th>}
          {contributions.map(({ species }) => (
            <th scope="col" key={species}>
              {speciesName(sheet, species)}
            </th>
          ))}
          {isFitted && <th scope="col">residual, mAU</th>}
          {isFitted && <th scope="col">point</th>}
        </tr>
      </thead>
      <tbody>
        {rows.map((i) => (
          <tr key={i}>
            <td>{wavelengthNm[i]}</td>
            <td>{text(measured[i], 4)}</td>
            {isFitted && <td>{text(fitted[i], 4)}</td>}
            {contributions.map(({ species, absorbance }) => (
              <td key={species}>{text(absorbance[i], 4)}</td>
            ))}
            {isFitted && <td>{text(1000 * (residual[i] ?? Number.NaN), 2)}</td>}
            {isFitted && <td>{pointText(use[i])}</td>}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
