import { Fragment } from 'preact';
import {
  type AliquotResult,
  figuresText,
  numberText,
  type Quantified,
  quantifiedText,
  type Sheet,
  separationText,
} from '../../../analysis/index.ts';
import { noiseOrigin, noiseText } from './noise-text.ts';

interface Props {
  readonly sheet: Sheet;
  readonly fit: AliquotResult['fit'];
}

/** How well the fit lies on the points, in figures. */
export function FitFigures({ sheet, fit }: Props) {
  const { noise, shiftNm, baseline, strayLight } = fit;
  return (
    <dl class="figures">
      <dt>points</dt>
      <dd>{fit.points}</dd>
      <dt>residual, rms</dt>
      <dd>{figuresText(1000 * fit.residualRms)} mAU</dd>
      <dt>reduced χ²</dt>
      <dd>{fit.reducedChiSquare === null ? 'not known' : numberText(fit.reducedChiSquare, 2)}</dd>
      <dt>noise, {noiseOrigin(noise)}</dt>
      <dd>{noiseText(noise)}</dd>
      {shiftNm.standardUncertainty !== 0 && (
        <>
          <dt>wavelength offset</dt>
          <dd>{withUncertainty(shiftNm, 'plain', 'nm')}</dd>
        </>
      )}
      {strayLight.from !== 'none' && (
        <>
          <dt>stray light</dt>
          <dd>
            {strayLight.from === 'fit'
              ? withUncertainty(strayLight, 'percent', '%')
              : `${figuresText(100 * (strayLight.value ?? 0))} % (stated)`}
          </dd>
        </>
      )}
      {baseline.map(({ term, absorbance }) => (
        <Fragment key={term}>
          <dt>baseline {term}</dt>
          <dd>{withUncertainty(absorbance, 'milliabsorbance', 'mAU')}</dd>
        </Fragment>
      ))}
      <dt>likeness of standards costs</dt>
      <dd>{separationText(sheet, fit)}</dd>
    </dl>
  );
}

function withUncertainty(
  quantity: Quantified,
  unit: 'plain' | 'percent' | 'milliabsorbance',
  name: string,
): string {
  const { value, uncertainty } = quantifiedText(quantity, { unit });
  return `${value} ${name} (u ${uncertainty})`;
}
