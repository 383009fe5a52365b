import { type AliquotResult, answerText } from '../../../analysis/index.ts';
import { whyNotFitted } from '../fit/why-not-fitted.ts';
import type { SectionProps } from '../section.ts';

/** The result of the aliquot that is shown. */
export function resultOf({ quantification, aliquot }: SectionProps): AliquotResult | undefined {
  return quantification?.results.aliquots.find((each) => each.aliquot === aliquot);
}

/** The answer in one line, for when the section is folded. */
export function splitSummary(props: SectionProps): string {
  const result = resultOf(props);
  if (!result)
    return whyNotFitted(props) === null ? 'no answer yet' : 'no answer from this aliquot';
  const answer = answerText(props.sheet, result);
  return answer ? `${answer.head} (${answer.interval})` : 'no ratio: fewer than two products';
}
