import type { EmbeddedSpectrum, Sheet } from '../../analysis/index.ts';
import { type Bands, epsilonAt, normal } from './synthetic.ts';

/** One invented measurement: what is true, and what the instrument does to it. */
export interface Conditions {
  readonly seed: number;
  /** Mono over mono and bis. */
  readonly fraction: number;
  /** Largest absorbance of the crude. */
  readonly absorbance: number;
  readonly stepNm: number;
  /** Points of the running mean that the instrument takes of what it records; 1 for none. */
  readonly smoothing: number;
  readonly noise: { readonly constant: number; readonly transmittance: number };
  /** Whether the sheet states the noise (what is left of it after smoothing). */
  readonly noiseStated: boolean;
  /** True offset in wavelength of the crude, nm. */
  readonly shiftNm: number;
  /** True stray light, in crude and standards alike. */
  readonly strayLight: number;
  /** Standard deviation of the baseline offset of each spectrum. */
  readonly offsetSd: number;
  /** Largest absorbance of each standard, relative standard uncertainties of its stock and its dilution. */
  readonly standards: readonly number[];
  readonly stock: number;
  readonly dilution: number;
  /** True: the standards are recorded without noise and offset, and their concentrations are exact. */
  readonly exactStandards: boolean;
  /** A species without a standard: centre and standard deviation in nm, height over the largest absorbance. */
  readonly hidden: readonly [number, number, number] | null;
  readonly fit: Sheet['fit'];
}

export const usual: Conditions = {
  seed: 1,
  fraction: 0.5,
  absorbance: 0.5,
  stepNm: 1,
  smoothing: 1,
  noise: { constant: 3e-4, transmittance: 2e-4 },
  noiseStated: false,
  shiftNm: 0,
  strayLight: 0,
  offsetSd: 5e-4,
  standards: [0.4, 0.9],
  stock: 0.005,
  dilution: 0.003,
  exactStandards: false,
  hidden: null,
  fit: {},
};

export const bands: Readonly<Record<'arm' | 'mono' | 'bis', Bands>> = {
  arm: [[275, 16, 9000]],
  mono: [
    [320, 20, 16000],
    [245, 12, 6000],
  ],
  bis: [
    [355, 22, 27000],
    [255, 14, 9000],
  ],
};
const names = ['arm', 'mono', 'bis'] as const;
const [from, to] = [230, 470];

/** A sheet of one aliquot with every spectrum drawn anew. `truth` is in mol/L. */
export function simulated(changes: Partial<Conditions>): {
  readonly sheet: Sheet;
  readonly truth: Readonly<Record<'arm' | 'mono' | 'bis', number>>;
} {
  const made = { ...usual, ...changes };
  const gauss = normal(made.seed);
  const nm = Array.from(
    { length: Math.round((to - from) / made.stepNm) + 1 },
    (_, i) => from + i * made.stepNm,
  );
  const record = recorder(made, nm, gauss);
  const recordStandard = made.exactStandards
    ? recorder({ ...made, noise: noNoise, offsetSd: 0 }, nm, gauss)
    : record;
  const errors = made.exactStandards ? { stock: 0, dilution: 0 } : made;
  const shape = { arm: 0.2, mono: 0.8 * made.fraction, bis: 0.8 * (1 - made.fraction) };
  const unit = (at: number) =>
    names.reduce((sum, name) => sum + shape[name] * epsilonAt(bands[name], at), 0);
  const largest = nm
    .filter((at) => at >= 240 && at <= 450)
    .reduce((most, at) => Math.max(most, unit(at)), 0);
  const total = made.absorbance / largest;
  const truth = { arm: shape.arm * total, mono: shape.mono * total, bis: shape.bis * total };
  const { hidden } = made;
  const crude = record((at) => {
    const band = hidden
      ? made.absorbance * hidden[2] * Math.exp(-0.5 * ((at - hidden[0]) / hidden[1]) ** 2)
      : 0;
    return total * unit(at - made.shiftNm) + band;
  });
  const sheet: Sheet = {
    format: 'monobis-sheet',
    version: 1,
    title: 'Simulated',
    reaction: { core: 'core', arm: 'arm', sites: 2 },
    species: [
      { id: 'core', cores: 1, arms: 0, absorbs: false },
      { id: 'arm', cores: 0, arms: 1 },
      { id: 'mono', cores: 1, arms: 1 },
      { id: 'bis', cores: 1, arms: 2 },
    ],
    stocks: names.map((name) => ({
      id: `${name}-A`,
      species: name,
      relativeStandardUncertainty: made.stock,
    })),
    standards: names.flatMap((name) => {
      const stockError = 1 + errors.stock * gauss();
      const top = Math.max(...bands[name].map(([, , height]) => height));
      return made.standards.map((peak, index) => {
        const stated = peak / top;
        const real = stated * stockError * (1 + errors.dilution * gauss());
        return {
          id: `${name}-${index + 1}`,
          species: name,
          stock: `${name}-A`,
          concentrationMolPerL: stated,
          relativeStandardUncertainty: made.dilution,
          spectrum: { embedded: recordStandard((at) => real * epsilonAt(bands[name], at)) },
        };
      });
    }),
    aliquots: [{ id: 'a1', spectrum: { embedded: crude } }],
    fit: {
      windowNm: [240, 450],
      baseline: 'offset',
      ...(made.noiseStated ? { noise: afterSmoothing(made) } : {}),
      ...made.fit,
    },
  };
  return { sheet, truth };
}

const noNoise = { constant: 0, transmittance: 0 };

function afterSmoothing({ noise, smoothing }: Conditions): Conditions['noise'] {
  const factor = 1 / Math.sqrt(smoothing);
  return { constant: noise.constant * factor, transmittance: noise.transmittance * factor };
}

/** Signal, stray light, offset, noise, then the running mean over what was read. */
function recorder(made: Conditions, nm: readonly number[], gauss: () => number) {
  const half = made.smoothing >> 1;
  return (absorbance: (at: number) => number): EmbeddedSpectrum => {
    const offset = made.offsetSd * gauss();
    const read = Array.from({ length: nm.length + 2 * half }, (_, i) => {
      const pure = absorbance(from + (i - half) * made.stepNm);
      const shown =
        made.strayLight === 0
          ? pure
          : -Math.log10((10 ** -pure + made.strayLight) / (1 + made.strayLight));
      const sd = Math.hypot(made.noise.constant, made.noise.transmittance * 10 ** shown);
      return shown + offset + sd * gauss();
    });
    const values = nm.map((_, i) => {
      let sum = 0;
      for (let k = 0; k <= 2 * half; k++) sum += read[i + k] ?? 0;
      return sum / (2 * half + 1);
    });
    return { name: 'simulated', wavelengthNm: [...nm], absorbance: values };
  };
}
