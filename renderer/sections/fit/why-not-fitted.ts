import type { SectionProps } from '../section.ts';

/** Why the aliquot that is shown has no answer, with what would mend it; null where it has one, or waits for it. */
export function whyNotFitted({
  quantification,
  obstacle,
  aliquot,
}: Pick<SectionProps, 'quantification' | 'obstacle' | 'aliquot'>): string | null {
  if (obstacle !== null) return obstacle;
  const refused = quantification?.results.refused.find(({ what }) => what === `aliquot ${aliquot}`);
  return refused?.why ?? null;
}
