import {
  armIntoCore,
  type CoreFedIntoArm,
  type Cores,
  coreFedIntoArm,
  lossRateFor,
} from './kinetics.ts';
import { kappa } from './parameters.ts';

/** Concentrations in a flask or a cuvette, mol/L. */
export type Composition = Readonly<
  Record<'piperazine' | 'arm' | 'mono' | 'bis' | 'hydrolysis', number>
>;

export interface SampleRun {
  readonly id: string;
  readonly name: string;
  readonly order: 'arm-into-core' | 'core-into-arm';
  readonly coreMol: number;
  readonly armMol: number;
  /** Final volume. */
  readonly volumeL: number;
  readonly additionTimeMin: number;
  /** Of the arm charged: the share that water took. */
  readonly armShareLost: number;
  /** Nominal dilution from flask to cuvette. */
  readonly dilutionFactor: number;
  /** What the flask holds at the end. */
  readonly flaskMolPerL: Composition;
  /** The parameters of the semi-batch model, where the run is not on the batch path. */
  readonly fed?: CoreFedIntoArm;
}

const armIntoCoreRun = {
  id: 'r1',
  name: 'Arm into core, 1.1 equivalents',
  order: 'arm-into-core',
  coreMol: 0.01,
  armMol: 0.011,
  volumeL: 0.06,
  additionTimeMin: 45,
  armShareLost: 0.015,
  dilutionFactor: 2400,
} as const;

/** Of the arm charged in r1: the share that has reacted, to products or with water. */
const armConversion = 0.97;

const coreIntoArmRun = {
  id: 'r2',
  name: 'Core slowly into arm, 2.0 equivalents',
  order: 'core-into-arm',
  coreMol: 0.01,
  armMol: 0.02,
  volumeL: 0.08,
  additionTimeMin: 120,
  armShareLost: 0.02,
  dilutionFactor: 4000,
} as const;

const fed: CoreFedIntoArm = {
  kappa,
  equivalents: coreIntoArmRun.armMol / coreIntoArmRun.coreMol,
  k1ConcentrationTime: 20,
  startVolumeShare: 0.5,
  hold: 1,
};

export const sampleRuns: readonly SampleRun[] = [finishWellMixed(), finishFed()];

export const aliquotsPerRun = 3;

function finishWellMixed(): SampleRun {
  const run = armIntoCoreRun;
  const equivalents = run.armMol / run.coreMol;
  const cores = armIntoCore(kappa, equivalents * (armConversion - run.armShareLost));
  const arm = equivalents * (1 - armConversion);
  return { ...run, flaskMolPerL: flask(run, cores, arm) };
}

function finishFed(): SampleRun {
  const run = coreIntoArmRun;
  const end = coreFedIntoArm(fed, lossRateFor(fed, run.armShareLost));
  return { ...run, fed, flaskMolPerL: flask(run, end, end.arm) };
}

function flask(
  run: Pick<SampleRun, 'coreMol' | 'armMol' | 'volumeL' | 'armShareLost'>,
  cores: Cores,
  armPerCore: number,
): Composition {
  const core = run.coreMol / run.volumeL;
  return {
    piperazine: core * cores.core,
    arm: core * armPerCore,
    mono: core * cores.mono,
    bis: core * cores.bis,
    hydrolysis: (run.armMol * run.armShareLost) / run.volumeL,
  };
}
