import type { CoreFedIntoArm } from './kinetics.ts';
import { inventedNote, kappa } from './parameters.ts';
import type { DrawnAliquot, DrawnBand, DrawnStandard } from './recording.ts';
import { type Composition, type SampleRun, sampleRuns } from './runs.ts';

/** How the products with core and arm divide: mono + bis = 1. */
interface TrueSplit {
  readonly fractions: { readonly mono: number; readonly bis: number };
  readonly ratioMonoToBis: number;
}

interface TrueRun extends TrueSplit {
  readonly run: string;
  readonly flaskMolPerL: Composition;
  /** Arms built into mono and bis, per core charged. */
  readonly armsTakenPerCore: number;
  /** Of the arm charged: reacted, to products or with water. */
  readonly armConversion: number;
  readonly armShareLost: number;
  readonly fed?: CoreFedIntoArm;
}

interface TrueAliquot extends TrueSplit {
  readonly aliquot: string;
  readonly run: string;
  readonly dilutionFactor: number;
  readonly offset: number;
  readonly cuvetteMolPerL: Composition;
  readonly flaskMolPerL: Composition;
  /** A species without a standard; its aliquot does not count in tests of coverage. */
  readonly hiddenBand: DrawnBand | null;
}

/** What the estimates are held against. Invented, and drawn with `seed`. */
export interface Truth {
  readonly invented: true;
  readonly note: string;
  readonly seed: number;
  readonly kappa: number;
  readonly runs: readonly TrueRun[];
  readonly aliquots: readonly TrueAliquot[];
  readonly standards: readonly {
    readonly standard: string;
    readonly concentrationMolPerL: number;
  }[];
}

export function truthOf(
  seed: number,
  standards: readonly DrawnStandard[],
  aliquots: readonly DrawnAliquot[],
): Truth {
  return {
    invented: true,
    note: inventedNote,
    seed,
    kappa,
    runs: sampleRuns.map(trueRun),
    aliquots: aliquots.map(
      ({ id, run, trueDilutionFactor, offset, cuvetteMolPerL, hiddenBand }) => ({
        aliquot: id,
        run: run.id,
        dilutionFactor: trueDilutionFactor,
        offset,
        cuvetteMolPerL,
        flaskMolPerL: run.flaskMolPerL,
        ...splitOf(run.flaskMolPerL),
        hiddenBand,
      }),
    ),
    standards: standards.map(({ standard, trueMolPerL }) => ({
      standard: standard.id,
      concentrationMolPerL: trueMolPerL,
    })),
  };
}

function trueRun(run: SampleRun): TrueRun {
  const { mono, bis, arm } = run.flaskMolPerL;
  return {
    run: run.id,
    flaskMolPerL: run.flaskMolPerL,
    ...splitOf(run.flaskMolPerL),
    armsTakenPerCore: ((mono + 2 * bis) * run.volumeL) / run.coreMol,
    armConversion: 1 - (arm * run.volumeL) / run.armMol,
    armShareLost: run.armShareLost,
    ...(run.fed === undefined ? {} : { fed: run.fed }),
  };
}

function splitOf({ mono, bis }: Composition): TrueSplit {
  const products = mono + bis;
  return {
    fractions: { mono: mono / products, bis: bis / products },
    ratioMonoToBis: mono / bis,
  };
}
