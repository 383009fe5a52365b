import type { EmbeddedSpectrum, Sheet } from '../../analysis/index.ts';

/** Bands of invented species: [centre nm, standard deviation nm, height L mol⁻¹ cm⁻¹]. */
export type Bands = readonly (readonly [number, number, number])[];

export interface Synthetic {
  readonly seed: number;
  readonly stepNm: number;
  readonly bands: Readonly<Record<string, Bands>>;
  /** Amounts in the cuvette, mol/L, one record for each aliquot. */
  readonly aliquots: readonly Readonly<Record<string, number>>[];
  readonly noise: { readonly constant: number; readonly transmittance: number };
  readonly offset: number;
  /** Added to the crude beside the species, absorbance by wavelength. */
  readonly extra: (nm: number) => number;
}

export const usual: Synthetic = {
  seed: 1,
  stepNm: 1,
  bands: {
    arm: [[275, 16, 9000]],
    mono: [
      [320, 20, 16000],
      [245, 12, 6000],
    ],
    bis: [
      [355, 22, 27000],
      [255, 14, 9000],
    ],
  },
  aliquots: [{ arm: 8e-6, mono: 2e-5, bis: 1.2e-5 }],
  noise: { constant: 3e-4, transmittance: 2e-4 },
  offset: 5e-4,
  extra: () => 0,
};

/** Uniform numbers in [0, 1): mulberry32, a small published generator. */
export function uniform(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/** Standard normal numbers by Box and Muller. */
export function normal(seed: number): () => number {
  const next = uniform(seed);
  return () => Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next());
}

export function epsilonAt(bands: Bands, nm: number): number {
  return bands.reduce(
    (sum, [centre, sd, height]) => sum + height * Math.exp(-0.5 * ((nm - centre) / sd) ** 2),
    0,
  );
}

/** A sheet with every spectrum embedded; two standards of one stock for each species. */
export function syntheticSheet(changes: Partial<Synthetic> = {}): Sheet {
  const made: Synthetic = { ...usual, ...changes };
  const gauss = normal(made.seed);
  const nm = Array.from(
    { length: Math.floor(240 / made.stepNm) + 1 },
    (_, i) => 230 + i * made.stepNm,
  );
  const recorded = (name: string, absorbance: (nm: number) => number): EmbeddedSpectrum => ({
    name,
    wavelengthNm: nm,
    absorbance: nm.map((at) => {
      const value = absorbance(at);
      return (
        value + Math.hypot(made.noise.constant, made.noise.transmittance * 10 ** value) * gauss()
      );
    }),
  });
  const species = Object.keys(made.bands);
  return {
    format: 'monobis-sheet',
    version: 1,
    title: 'Synthetic',
    reaction: { core: 'core', arm: 'arm', sites: 2 },
    species: [
      { id: 'core', cores: 1, arms: 0, absorbs: false },
      ...species.map((id) => ({
        id,
        cores: id === 'mono' || id === 'bis' ? 1 : 0,
        arms: { arm: 1, mono: 1, bis: 2 }[id] ?? 0,
      })),
    ],
    stocks: species.map((id) => ({
      id: `${id}-A`,
      species: id,
      relativeStandardUncertainty: 0.005,
    })),
    standards: species.flatMap((id) =>
      [0.4, 0.9].map((peak, index) => {
        const bands = made.bands[id] ?? [];
        const concentrationMolPerL = peak / Math.max(...bands.map(([, , height]) => height));
        return {
          id: `${id}-${index + 1}`,
          species: id,
          stock: `${id}-A`,
          concentrationMolPerL,
          relativeStandardUncertainty: 0.003,
          spectrum: { embedded: recorded(id, (at) => concentrationMolPerL * epsilonAt(bands, at)) },
        };
      }),
    ),
    runs: [{ id: 'r1' }],
    aliquots: made.aliquots.map((amounts, index) => ({
      id: `a${index + 1}`,
      run: 'r1',
      dilution: { factor: 1000, relativeStandardUncertainty: 0.004 },
      spectrum: {
        embedded: recorded(`a${index + 1}`, (at) =>
          species.reduce(
            (sum, id) => sum + (amounts[id] ?? 0) * epsilonAt(made.bands[id] ?? [], at),
            made.offset + made.extra(at),
          ),
        ),
      },
    })),
    fit: { windowNm: [240, 450], baseline: 'offset', upperAbsorbance: 2 },
  };
}
