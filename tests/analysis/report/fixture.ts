import type { Sheet } from '../../../analysis/index.ts';
import {
  type AliquotCurves,
  type AliquotResult,
  leftOut,
  type Quantification,
  type Quantified,
  type StandardCurves,
} from '../../../analysis/split/results.ts';

/**
 * A hand-made sheet and its results, invented, with what real ones seldom have together: ends that
 * are not bounded, amounts below detection, a balance, a comparison, a refusal, doubts with and
 * without wavelengths, points left out for every reason, and texts of the user that are hostile.
 */
export const hostile = `"></style></svg><script>alert('x')</script>&amp;\u2028{{`;

type End = number | null;
export const quantified = (value: End, u: End, low: End, high: End): Quantified => ({
  value,
  standardUncertainty: u,
  interval95: [low, high],
});

export const sheet: Sheet = {
  format: 'monobis-sheet',
  version: 1,
  title: 'Two orders of addition',
  invented: true,
  reaction: { core: 'diamine', arm: 'chloride', sites: 2 },
  species: [
    { id: 'diamine', cores: 1, arms: 0, absorbs: false, molarMassGPerMol: 86.14 },
    { id: 'chloride', cores: 0, arms: 1 },
    { id: 'mono', name: 'mono-arylated diamine, a rather long name', cores: 1, arms: 1 },
    { id: 'bis', cores: 1, arms: 2 },
    { id: 'other', cores: 0, arms: 0 },
  ],
  stocks: [{ id: 'mono-A', species: 'mono', relativeStandardUncertainty: 0.006 }],
  standards: [
    {
      id: 'S1',
      species: 'mono',
      stock: 'mono-A',
      spectrum: { file: 'standards/mono.csv', trace: 1 },
      concentrationMolPerL: 2e-5,
      relativeStandardUncertainty: 0.004,
    },
    {
      id: 'S2',
      species: 'bis',
      kind: 'molar-absorptivity',
      spectrum: { file: 'standards/bis.csv' },
    },
  ],
  runs: [
    { id: 'r1', name: 'arm into core', order: 'arm-into-core', chargedMol: { diamine: 0.01 } },
    { id: 'r2', order: 'together', volumeL: 0.06, additionTimeMin: 45 },
  ],
  aliquots: [
    {
      id: 'a1',
      run: 'r1',
      spectrum: { file: 'crude/1.csv' },
      dilution: { factor: 2400, relativeStandardUncertainty: 0.005 },
    },
    {
      id: 'a2',
      run: 'r2',
      spectrum: { file: 'crude/2.csv' },
      dilution: { steps: [{ takeMl: 1, toMl: 100 }] },
    },
    { id: 'a3', spectrum: { file: 'crude/3.csv' } },
  ],
  fit: { windowNm: [250, 430], excludeNm: [[300, 304]], baseline: 'line' },
};

const fit: AliquotResult['fit'] = {
  points: 178,
  windowNm: [250, 430],
  residualRms: 4.1e-4,
  reducedChiSquare: 1.02,
  shiftNm: quantified(0.12, 0.021, 0.08, 0.16),
  baseline: [
    { term: 'offset', absorbance: quantified(4e-4, 1e-4, 2e-4, 6e-4) },
    { term: 'slope', absorbance: quantified(-3e-5, 9e-5, -2.1e-4, 1.5e-4) },
  ],
  strayLight: { ...quantified(0, 0, 0, 0), from: 'none' },
  separation: [
    { species: 'chloride', inflation: 1.2 },
    { species: 'mono', inflation: 2.9 },
    { species: 'bis', inflation: 2.7 },
  ],
  noise: { constant: 3.1e-4, transmittance: 2.2e-4, from: 'spectrum' },
};

const first: AliquotResult = {
  aliquot: 'a1',
  run: 'r1',
  concentrations: [
    {
      species: 'chloride',
      cuvetteMolPerL: quantified(0, 3e-8, 0, 6.2e-8),
      flaskMolPerL: quantified(0, 7.3e-5, 0, 1.51e-4),
      detected: false,
      detectionLimitMolPerL: 1.1e-7,
    },
    {
      species: 'mono',
      cuvetteMolPerL: quantified(2.003e-5, 1.3e-7, 1.977e-5, 2.029e-5),
      flaskMolPerL: quantified(0.048_07, 4e-4, 0.047_27, 0.048_87),
      detected: true,
      detectionLimitMolPerL: 9e-8,
    },
    {
      species: 'bis',
      cuvetteMolPerL: quantified(8.43e-6, 6e-8, 8.31e-6, 8.55e-6),
      flaskMolPerL: quantified(0.020_23, 2e-4, 0.019_83, 0.020_63),
      detected: true,
      detectionLimitMolPerL: 7e-8,
    },
  ],
  split: [
    { species: 'mono', fraction: quantified(0.7038, 0.0017, 0.700_47, 0.707_12) },
    { species: 'bis', fraction: quantified(0.2962, 0.0017, 0.292_88, 0.299_53) },
  ],
  ratios: [{ of: 'mono', to: 'bis', value: quantified(2.376, 0.0193, 2.3386, 2.4144) }],
  budget: [
    { source: 'photometric noise', share: 0.62 },
    { source: 'stock mono-A', share: 0.38 },
  ],
  fit,
  doubts: [
    {
      code: 'unexplained-band',
      message: 'The residual stands above the noise at 318 to 342 nm & near 410 nm.',
      atNm: [318, 342, 408, 412],
    },
    {
      code: 'below-detection',
      message: 'The "chloride" is below its detection limit here.',
      species: ['chloride'],
    },
  ],
  notes: ['No path length was given; 1 cm was taken.'],
};

/** Nothing of bis to be seen, and the noise known from the residual only. */
const second: AliquotResult = {
  ...first,
  aliquot: 'a2',
  run: 'r2',
  split: [
    { species: 'mono', fraction: quantified(1, 0.0021, 0.9964, 1) },
    { species: 'bis', fraction: quantified(0, 0.0021, 0, 0.0036) },
  ],
  ratios: [{ of: 'mono', to: 'bis', value: quantified(null, null, 276.8, null) }],
  fit: { ...fit, reducedChiSquare: null, shiftNm: quantified(0, 0, 0, 0), baseline: [] },
  budget: [],
  doubts: [],
  notes: [],
};

function bell(centre: number, sd: number, height: number): (nm: number) => number {
  return (nm) => height * Math.exp(-0.5 * ((nm - centre) / sd) ** 2);
}

const shapes = [
  ['chloride', bell(275, 14, 9000)],
  ['mono', bell(330, 22, 16_000)],
  ['bis', bell(365, 25, 27_000)],
] as const;

const wavelengthNm = Float64Array.from({ length: 221 }, (_, i) => 230 + i);

function useOf(nm: number): number {
  if (nm >= 300 && nm <= 304) return leftOut.excluded;
  if (nm === 260) return leftOut.missing;
  if (nm === 251 || nm === 252) return leftOut.aboveUpperAbsorbance;
  if (nm >= 440) return leftOut.noStandard;
  return nm < 250 || nm > 430 ? leftOut.outsideWindow : leftOut.used;
}

export function curvesOf(aliquot: string): AliquotCurves {
  const contributions = shapes.map(([species, epsilon], k) => ({
    species,
    absorbance: wavelengthNm.map((nm) => epsilon(nm) * ([3e-6, 2e-5, 8.4e-6][k] ?? 0)),
  }));
  const fitted = wavelengthNm.map((nm, i) =>
    useOf(nm) === leftOut.noStandard
      ? Number.NaN
      : contributions.reduce((sum, { absorbance }) => sum + (absorbance[i] ?? 0), 4e-4),
  );
  const residual = wavelengthNm.map((nm, i) => {
    if (Number.isNaN(fitted[i]) || useOf(nm) === leftOut.missing) return Number.NaN;
    return 4e-4 * Math.sin(1.7 * i) + bell(330, 6, 2e-3)(nm);
  });
  return {
    aliquot,
    wavelengthNm,
    measured: wavelengthNm.map((_, i) => (fitted[i] ?? 0) + (residual[i] ?? 0)),
    use: Uint8Array.from(wavelengthNm, useOf),
    fitted,
    contributions,
    baseline: wavelengthNm.map(() => 4e-4),
    residual,
    expectedSd: wavelengthNm.map(() => 3.5e-4),
  };
}

const standards: readonly StandardCurves[] = shapes.map(([species, epsilon]) => ({
  species,
  wavelengthNm,
  molarAbsorptivity: wavelengthNm.map(epsilon),
  noiseSd: wavelengthNm.map(() => 12),
  relativeScaleUncertainty: 0.0066,
  solutions: [
    {
      standard: 'S1',
      wavelengthNm,
      molarAbsorptivity: wavelengthNm.map(epsilon),
      factor: 1.0018,
      offset: 0.0021,
    },
  ],
  linearity: { testedUpTo: 1.1, straightUpTo: 1.1 },
}));

export const quantification: Quantification = {
  results: {
    format: 'monobis-results',
    version: 1,
    program: 'monobis test',
    title: 'Two orders of addition',
    aliquots: [first, second],
    runs: [
      {
        run: 'r1',
        aliquots: 1,
        split: first.split,
        ratios: first.ratios,
        balance: {
          coresFound: quantified(0.8133, 0.004, 0.8055, 0.821),
          armsFound: quantified(0.9881, 0.0047, 0.9788, 0.9974),
        },
      },
      {
        run: 'r2',
        aliquots: 1,
        split: second.split,
        ratios: second.ratios,
        balance: { coresFound: null, armsFound: null },
      },
    ],
    comparisons: [
      {
        runs: ['r1', 'r2'],
        of: 'mono',
        to: 'bis',
        ratioOfRatios: quantified(0.0081, null, null, 0.0087),
        pValue: 3.4e-7,
      },
    ],
    refused: [
      {
        what: 'aliquot a3',
        why: 'Its range <of wavelengths> does not meet that of the standards.',
        line: null,
        code: 'no-overlap',
        mend: 'Record it over the range of the standards.',
      },
    ],
    warnings: [],
  },
  curves: [curvesOf('a1'), curvesOf('a2')],
  standards,
};

export const options = {
  madeOn: '2026-12-01T12:00:00.000Z',
  program: 'monobis test',
  warnings: ['"colour" is not known; it is kept.'],
  sources: [
    {
      file: 'crude/1.csv',
      sha256: 'ab'.repeat(32),
      what: 'aliquot a1',
      decisions: ['A decimal comma was read.'],
    },
    { file: 'typed in', sha256: '', what: 'standard S2', decisions: [] },
  ],
};

/** Every text of the sheet and of the results that a user or a file can choose, made hostile. */
export function madeHostile(): { sheet: Sheet; quantification: Quantification } {
  const keys = new Set(['title', 'name', 'message', 'what', 'why', 'source', 'file']);
  const ids = ['diamine', 'chloride', 'mono', 'bis', 'other', 'S1', 'r1', 'r2', 'a1', 'a2'];
  const change = (key: string, text: string): string =>
    keys.has(key) || ids.includes(text) ? text + hostile : text;
  return {
    sheet: rewritten(sheet, change),
    quantification: rewritten(quantification, change),
  };
}

/** A copy with every text passed through `change`; typed arrays are kept. */
function rewritten<T>(value: T, change: (key: string, text: string) => string): T {
  const copy = structuredClone(value);
  rewrite(copy, change);
  return copy;
}

function rewrite(value: unknown, change: (key: string, text: string) => string, key = ''): void {
  if (value === null || typeof value !== 'object' || ArrayBuffer.isView(value)) return;
  for (const [name, each] of Object.entries(value)) {
    const member = Array.isArray(value) ? key : name;
    if (typeof each === 'string') Reflect.set(value, name, change(member, each));
    else rewrite(each, change, member);
  }
}
