import { type AliquotResult, figuresText } from '../../../analysis/index.ts';

type Noise = Pick<AliquotResult['fit']['noise'], 'constant' | 'transmittance'>;

/** The noise of one reading in words; a part that is nothing is not spoken of. */
export function noiseText({ constant, transmittance }: Noise): string {
  const parts = [
    constant > 0 ? `${figuresText(1000 * constant)} mAU constant` : '',
    transmittance > 0 ? `${figuresText(1000 * transmittance)} mAU from transmittance` : '',
  ].filter((part) => part !== '');
  return parts.length === 0 ? 'none' : parts.join(', ');
}
