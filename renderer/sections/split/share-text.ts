import { type Quantified, quantifiedText } from '../../../analysis/index.ts';

/** A share of the products as it is written on its bar: "11.90 %"; a bound where that is all there is. */
export function shareText(fraction: Quantified): string {
  const { value, low, high } = quantifiedText(fraction, { unit: 'percent' });
  const [from, to] = fraction.interval95;
  const isOpenBelow = from === null || from <= 0;
  const isOpenAbove = to === null || to >= 1;
  if (isOpenBelow && isOpenAbove) return 'not bounded';
  if (isOpenBelow) return `below ${high} %`;
  if (isOpenAbove) return `above ${low} %`;
  return `${value} %`;
}
