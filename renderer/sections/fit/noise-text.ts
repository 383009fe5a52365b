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

const origins: Readonly<Record<AliquotResult['fit']['noise']['from'], string>> = {
  sheet: 'given',
  scans: 'from the scans',
  spectrum: 'estimated',
};

/** Where the noise is from, in a word or two. */
export function noiseOrigin({ from }: Pick<AliquotResult['fit']['noise'], 'from'>): string {
  return origins[from];
}
