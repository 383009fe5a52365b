import { figuresText } from '../../../analysis/index.ts';
import type { SectionProps } from '../section.ts';
import { whyNotFitted } from './why-not-fitted.ts';

/** The fit in one line, for when the section is folded. */
export function fitSummary(props: SectionProps): string {
  const { quantification, aliquot } = props;
  const result = quantification?.results.aliquots.find((each) => each.aliquot === aliquot);
  if (!result) {
    return aliquot === null || whyNotFitted(props) === null
      ? 'nothing fitted yet'
      : `${aliquot}: cannot be fitted`;
  }
  const { fit } = result;
  return `${result.aliquot}: ${fit.points} points, ${fit.windowNm[0]} to ${fit.windowNm[1]} nm, residual ${figuresText(1000 * fit.residualRms)} mAU`;
}
