import { absorbingSpecies, molarAbsorptivity } from './bands.ts';
import { type Export, sampleExports } from './exports.ts';
import { noiseDeviation, normalSource } from './noise.ts';
import {
  aliquotDilutionRelativeUncertainty,
  aliquotOffsetDeviation,
  fitWindowNm,
  hiddenBand,
  photometricNoise,
  standardDilutionRelativeUncertainty,
  stockRelativeUncertainty,
} from './parameters.ts';
import { aliquotsPerRun, type Composition, type SampleRun, sampleRuns } from './runs.ts';
import { type StandardSolution, standardSolutions } from './standards.ts';
import type { Trace } from './trace.ts';

/** What one draw of all errors gave for a standard. */
export interface DrawnStandard {
  readonly standard: StandardSolution;
  readonly trueMolPerL: number;
  readonly trace: Trace;
}

export interface DrawnBand {
  readonly centreNm: number;
  readonly standardDeviationNm: number;
  readonly absorbance: number;
}

/** What one draw of all errors gave for an aliquot. */
export interface DrawnAliquot {
  readonly id: string;
  readonly run: SampleRun;
  readonly trueDilutionFactor: number;
  readonly offset: number;
  readonly cuvetteMolPerL: Composition;
  readonly hiddenBand: DrawnBand | null;
  readonly trace: Trace;
}

/** Every standard with its true concentration: label · (1 + stock error) · (1 + dilution error). */
export function drawStandards(seed: number): readonly DrawnStandard[] {
  return standardSolutions.map((standard) => {
    const { id, stock, concentrationMolPerL } = standard;
    // The stream is the stock's, so all its solutions share one draw.
    const ofStock = stockRelativeUncertainty * normalSource(seed, `stock ${stock.id}`)();
    const ofDilution = standardDilutionRelativeUncertainty * normalSource(seed, `dilution ${id}`)();
    const trueMolPerL = concentrationMolPerL * (1 + ofStock) * (1 + ofDilution);
    const label = `${stock.species}, ${concentrationMolPerL.toExponential(1)} mol/L, stock ${stock.id}`;
    const trace = record(
      seed,
      { id, label },
      (nm) => trueMolPerL * molarAbsorptivity(stock.species, nm),
    );
    return { standard, trueMolPerL, trace };
  });
}

/** Three aliquots of each run, each with its own true dilution, blank level and noise. */
export function drawAliquots(seed: number): readonly DrawnAliquot[] {
  return sampleRuns.flatMap((run) =>
    Array.from({ length: aliquotsPerRun }, (_, i) => drawAliquot(seed, run, `${run.id}-a${i + 1}`)),
  );
}

function drawAliquot(seed: number, run: SampleRun, id: string): DrawnAliquot {
  const ofDilution = aliquotDilutionRelativeUncertainty * normalSource(seed, `dilution ${id}`)();
  const trueDilutionFactor = run.dilutionFactor * (1 + ofDilution);
  const offset = aliquotOffsetDeviation * normalSource(seed, `offset ${id}`)();
  const cuvetteMolPerL = diluted(run.flaskMolPerL, trueDilutionFactor);
  const known = (nm: number): number => absorbanceOf(cuvetteMolPerL, nm);
  const hidden = id === hiddenBand.aliquot ? bandBeside(known) : null;
  const trace = record(
    seed,
    { id, label: id },
    (nm) => offset + known(nm) + (hidden === null ? 0 : gaussian(hidden, nm)),
  );
  return { id, run, trueDilutionFactor, offset, cuvetteMolPerL, hiddenBand: hidden, trace };
}

/** The true absorbance with a draw of the noise on every point. */
function record(
  seed: number,
  named: Pick<Trace, 'id' | 'label'>,
  trueAbsorbance: (wavelengthNm: number) => number,
): Trace {
  const { wavelengthNm } = exportOf(named.id);
  const normal = normalSource(seed, `noise ${named.id}`);
  const absorbance = wavelengthNm.map((nm) => {
    const a = trueAbsorbance(nm);
    return a + noiseDeviation(photometricNoise, a) * normal();
  });
  return { ...named, wavelengthNm, absorbance };
}

function exportOf(id: string): Export {
  const found = sampleExports.find(({ traces }) => traces.includes(id));
  if (found === undefined) throw new RangeError(`no export holds ${id}`);
  return found;
}

function absorbanceOf(molPerL: Composition, nm: number): number {
  return absorbingSpecies.reduce((sum, id) => sum + molPerL[id] * molarAbsorptivity(id, nm), 0);
}

function diluted(flask: Composition, factor: number): Composition {
  return {
    piperazine: flask.piperazine / factor,
    arm: flask.arm / factor,
    mono: flask.mono / factor,
    bis: flask.bis / factor,
    hydrolysis: flask.hydrolysis / factor,
  };
}

/** The long-wave maximum is meant, not the rising edge at the short end of the window. */
function bandBeside(known: (nm: number) => number): DrawnBand {
  const { centreNm, standardDeviationNm, shareOfLargest } = hiddenBand;
  let largest = 0;
  for (let nm = longWaveFromNm; nm <= fitWindowNm[1]; nm++) largest = Math.max(largest, known(nm));
  return { centreNm, standardDeviationNm, absorbance: shareOfLargest * largest };
}

const longWaveFromNm = 300;

function gaussian(band: DrawnBand, nm: number): number {
  const z = (nm - band.centreNm) / band.standardDeviationNm;
  return band.absorbance * Math.exp(-0.5 * z * z);
}
