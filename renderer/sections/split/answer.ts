import {
  type Quantified,
  quantifiedText,
  type RatioResult,
  type Sheet,
  type SplitFraction,
  speciesName,
} from '../../../analysis/index.ts';

/** The answer as it is read aloud: one line in large type, one under it. */
export interface AnswerText {
  readonly head: string;
  /** "95 %: 2.24 to 2.38". */
  readonly interval: string;
}

interface Answer {
  readonly split: readonly SplitFraction[];
  readonly ratios: readonly RatioResult[];
}

/** The ratio of the first two products; in words where there is none to give. */
export function answerText(sheet: Sheet, { split, ratios }: Answer): AnswerText | null {
  const [ratio] = ratios;
  if (!ratio) return null;
  const [of, to] = [speciesName(sheet, ratio.of), speciesName(sheet, ratio.to)];
  const missing = [ratio.to, ratio.of].find((id) => fractionOf(split, id)?.interval95[0] === 0);
  if (missing !== undefined) {
    const fraction = fractionOf(split, missing);
    const upper = fraction ? quantifiedText(fraction, { unit: 'percent' }).high : '—';
    const other = missing === ratio.to ? of : to;
    return {
      head: `no ${speciesName(sheet, missing)} to be seen`,
      interval: `less than ${upper} % of the products (95 %); the rest is ${other}`,
    };
  }
  const { value, interval } = quantifiedText(ratio.value, { unit: 'plain' });
  return { head: `${of} : ${to} = ${value} : 1`, interval: `95 %: ${interval}` };
}

function fractionOf(split: readonly SplitFraction[], id: string): Quantified | undefined {
  return split.find(({ species }) => species === id)?.fraction;
}

/** What would help most, from the largest share of the variance. */
export function adviceFor(source: string): string {
  if (source.startsWith('stock '))
    return `Weigh ${source} anew, or make a second stock of that species.`;
  if (source.startsWith('dilution of '))
    return 'Make more solutions of that species, or dilute with better glassware.';
  if (source.startsWith('scale of '))
    return 'Measure that standard again with a smaller uncertainty.';
  if (source.startsWith('scatter between'))
    return 'Find out which solution stands apart, and make it again.';
  if (source === 'noise of the standards')
    return 'Average more scans of the standards, or use stronger solutions.';
  if (source === 'lack of fit')
    return 'The model does not describe the spectrum: look at the residual and the doubts first.';
  if (source === 'baseline') return 'Record the blank with care and take a simpler baseline.';
  if (source === 'wavelength offset')
    return 'Check the wavelength scale, so that the offset need not be fitted.';
  if (source === 'standards of the same shape')
    return 'Widen the window to where the standards differ.';
  return 'Average more scans, or dilute less so that the weak species absorb more.';
}
