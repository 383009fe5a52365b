import {
  figuresText,
  numberText,
  type Sheet,
  type StandardCurves,
} from '../../../analysis/index.ts';
import { linearityText } from './linearity-text.ts';

interface AgreementTableProps {
  readonly sheet: Sheet;
  readonly standards: readonly StandardCurves[];
}

/** How the solutions of each species meet: what was done to each, and whether they are linear together. */
export function AgreementTable({ sheet, standards }: AgreementTableProps) {
  const several = standards.filter(({ solutions }) => solutions.length > 1);
  if (several.length === 0) return null;
  return (
    <>
      <table class="ledger narrow">
        <caption>How the solutions of one species meet</caption>
        <thead>
          <tr>
            <th scope="col">Standard</th>
            <th
              scope="col"
              class="number"
              title="How far its molar absorptivity was brought to meet the others'"
            >
              moved by, %
            </th>
            <th
              scope="col"
              class="number"
              title="A constant of its own baseline, which was taken out before"
            >
              offset taken out, mAU
            </th>
            <th
              scope="col"
              class="number"
              title="Relative standard uncertainty of the scale of ε of the species"
            >
              u of their ε, %
            </th>
          </tr>
        </thead>
        <tbody>
          {several.flatMap(({ solutions, relativeScaleUncertainty }) =>
            solutions.map(({ standard, factor, offset }, index) => (
              <tr key={standard}>
                <td>{standard}</td>
                <td class="number">{numberText(100 * (factor - 1), 2)}</td>
                <td class="number">{numberText(1000 * offset, 2)}</td>
                <td class="number">
                  {index === 0 ? figuresText(100 * relativeScaleUncertainty) : ''}
                </td>
              </tr>
            )),
          )}
        </tbody>
      </table>
      <p class="soft">{linearityText(sheet, several)}</p>
    </>
  );
}
