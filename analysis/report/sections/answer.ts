import { speciesLabel } from '../../sheet/defaults.ts';
import type { Sheet } from '../../sheet/schema.ts';
import type { Quantified, RatioResult, SplitFraction } from '../../split/results.ts';
import { quantifiedText } from '../numbers.ts';

/** The answer as it is read aloud: one line in large type, one under it. The same on screen and in print. */
export interface AnswerText {
  readonly head: string;
  /** "95 %: 2.24 to 2.38". */
  readonly interval: string;
}

interface Answer {
  readonly split: readonly SplitFraction[];
  readonly ratios: readonly RatioResult[];
}

/**
 * The ratio of the first two products, in words where one of them is not to be seen; the split where
 * there is no ratio; null where there is no product.
 */
export function answerText(sheet: Sheet, { split, ratios }: Answer): AnswerText | null {
  const [ratio] = ratios;
  if (!ratio) return splitText(sheet, split);
  const [of, to] = [speciesLabel(sheet, ratio.of), speciesLabel(sheet, ratio.to)];
  const unseen = [ratio.of, ratio.to].filter((id) => fractionOf(split, id)?.interval95[0] === 0);
  if (unseen.length === 2) {
    return {
      head: `${of} : ${to} cannot be told`,
      interval: 'the spectrum does not bound the share of either',
    };
  }
  const [missing] = unseen;
  if (missing !== undefined) {
    const fraction = fractionOf(split, missing);
    const upper = fraction ? quantifiedText(fraction, { unit: 'percent' }).high : '—';
    const rest = split.length > 2 ? '' : `; the rest is ${missing === ratio.to ? of : to}`;
    return {
      head: `no ${speciesLabel(sheet, missing)} to be seen`,
      interval: `less than ${upper} % of the products (95 %)${rest}`,
    };
  }
  const { value, interval } = quantifiedText(ratio.value, { unit: 'plain' });
  return {
    head:
      ratio.value.value === null ? `${of} : ${to} cannot be told` : `${of} : ${to} = ${value} : 1`,
    interval: `95 %: ${interval}`,
  };
}

function splitText(sheet: Sheet, split: readonly SplitFraction[]): AnswerText | null {
  if (split.length === 0) return null;
  const texts = split.map(({ species, fraction }) => {
    const { value, interval } = quantifiedText(fraction, { unit: 'percent' });
    return { name: speciesLabel(sheet, species), value, interval };
  });
  return {
    head: texts.map(({ name, value }) => `${name} ${value} %`).join(', '),
    interval:
      texts.length === 1
        ? 'the only product on this sheet'
        : `95 %: ${texts.map(({ name, interval }) => `${name} ${interval} %`).join(', ')}`,
  };
}

function fractionOf(split: readonly SplitFraction[], id: string): Quantified | undefined {
  return split.find(({ species }) => species === id)?.fraction;
}
