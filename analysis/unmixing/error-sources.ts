import { smoothed } from '../spectrum/correlated-noise.ts';
import { dot } from '../spectrum/vectors.ts';
import type { MolarAbsorptivity } from '../standards/molar-absorptivity.ts';
import type { Unmixing } from './unmix.ts';

/**
 * What makes the amounts of one aliquot uncertain, source by source. Effects are changes of the
 * amounts (mol/L, one entry a species) per standard deviation of the source; sources that two
 * aliquots share (all but `points`) stand in the same order in both, so that they cancel where
 * the aliquots are compared. GUM (JCGM 100), 5.2: correlated inputs.
 */
export interface ErrorSources {
  /** Covariance of the amounts from photometric noise and lack of fit, species × species, (mol/L)². */
  readonly points: readonly Float64Array[];
  /** The same from directions that the data do not see; all zero as a rule. */
  readonly unseen: readonly Float64Array[];
  readonly scale: readonly { readonly source: string; readonly effect: Float64Array }[];
  /** Point noise of each standard's spectrum: species rows × its points. */
  readonly standardsNoise: readonly {
    readonly standard: string;
    readonly effects: readonly Float64Array[];
  }[];
}

export function errorSources(unmixing: Unmixing): ErrorSources {
  const { amounts, covariance, standards } = unmixing;
  const size = amounts.length;
  return {
    points: covariance.slice(0, size).map((row) => row.slice(0, size)),
    unseen: unseenCovariance(unmixing),
    scale: standards.flatMap((standard, k) => [
      ...standard.scaleErrors.map(({ source, relative }) => {
        const effect = new Float64Array(size);
        effect[k] = -relative * Math.max(amounts[k]!, 0);
        return { source, effect };
      }),
      ...constantErrors(unmixing, k),
    ]),
    standardsNoise: standards.flatMap((standard, k) =>
      standard.solutions.map((solution, s) => ({
        standard: solution.standard,
        effects: standardNoiseEffects(unmixing, k, s),
      })),
    ),
  };
}

/**
 * A constant in the ε of one species that its solutions leave open. A fitted offset takes it up: the
 * gains then sum to 0 but for rounding, and there is no such source.
 */
function constantErrors(
  { fit, amounts, pathLengthCm, standards, baseline }: Unmixing,
  species: number,
): ErrorSources['scale'] {
  const standard = standards[species];
  if (!standard || standard.constantUncertainty === 0 || baseline.length > 0) return [];
  const strength = -pathLengthCm * Math.max(amounts[species]!, 0) * standard.constantUncertainty;
  return [
    {
      source: `offsets of the standards of ${standard.species}`,
      effect: Float64Array.from(
        amounts,
        (_, l) =>
          strength * (fit.gain[l] ?? new Float64Array()).reduce((sum, value) => sum + value, 0),
      ),
    },
  ];
}

/** What an aliquot has for itself: noise, lack of fit, and what the data do not see. */
export function ownCovariance({ points, unseen }: ErrorSources): Float64Array[] {
  return sumOf([points, unseen]);
}

/** What all aliquots share: the standards' scales and their noise. */
export function commonCovariance(sources: ErrorSources): Float64Array[] {
  const rows = commonEffects(sources);
  return rows.map((a) =>
    Float64Array.from(rows, (b) => {
      let sum = 0;
      for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
      return sum;
    }),
  );
}

/** Effects of all shared sources side by side: species rows × sources, per standard deviation. */
export function commonEffects({ points, scale, standardsNoise }: ErrorSources): Float64Array[] {
  return points.map((_, k) => {
    const parts = standardsNoise.map(({ effects }) => effects[k] ?? new Float64Array());
    const length = parts.reduce((sum, part) => sum + part.length, scale.length);
    const row = new Float64Array(length);
    let at = 0;
    for (const { effect } of scale) row[at++] = effect[k]!;
    for (const part of parts) {
      row.set(part, at);
      at += part.length;
    }
    return row;
  });
}

/**
 * Variance that the point noise of the standards gives to what a gain reads off the fitted points, in
 * its unit squared.
 *
 * @param gain one entry a fitted point
 */
export function standardsNoiseThrough(unmixing: Unmixing, gain: Float64Array): number {
  let variance = 0;
  for (const [k, { solutions }] of unmixing.standards.entries()) {
    for (const s of solutions.keys()) {
      const effect = standardNoiseEffect(unmixing, k, s, gain);
      variance += dot(effect, effect);
    }
  }
  return variance;
}

function standardNoiseEffects(
  unmixing: Unmixing,
  species: number,
  solution: number,
): Float64Array[] {
  return unmixing.fit.gain
    .slice(0, unmixing.amounts.length)
    .map((gain) => standardNoiseEffect(unmixing, species, solution, gain));
}

/** Change of what `gain` reads off, per standard deviation of each independent source of noise. */
function standardNoiseEffect(
  { at, amounts, pathLengthCm, molarAbsorptivity, correlation, standardsLevel }: Unmixing,
  species: number,
  solution: number,
  gain: Float64Array,
): Float64Array {
  const part = partOf(molarAbsorptivity, species, solution);
  const strength = -Math.sqrt(standardsLevel) * pathLengthCm * Math.max(amounts[species]!, 0);
  const effect = new Float64Array(part.sd.length);
  if (strength === 0) return effect;
  const { start, point, value } = part.gives;
  for (let j = 0; j < at.length; j++) {
    const i = at[j]!;
    const size = strength * gain[j]!;
    for (let m = start[i]!; m < start[i + 1]!; m++) effect[point[m]!]! += size * value[m]!;
  }
  for (let j = 0; j < effect.length; j++) effect[j]! *= part.sd[j]!;
  return smoothed(correlation.kernel, effect);
}

function partOf(
  molarAbsorptivity: readonly MolarAbsorptivity[],
  species: number,
  solution: number,
): MolarAbsorptivity['parts'][number] {
  const part = molarAbsorptivity[species]?.parts[solution];
  if (!part) throw new Error(`no solution ${solution} of species ${species}`);
  return part;
}

/**
 * A direction that the data do not see leaves the amounts along it open to anything that keeps
 * them non-negative: its standard deviation is taken as all that the species in it hold together.
 */
function unseenCovariance({ fit, amounts, drawn }: Unmixing): Float64Array[] {
  const covariance = Array.from(amounts, () => new Float64Array(amounts.length));
  for (const direction of fit.unseen) {
    let [largest, held] = [0, 0];
    for (const k of amounts.keys()) {
      if (!takesPart(direction, k)) continue;
      largest = Math.max(largest, Math.abs(direction[k]!));
      held += Math.abs(drawn[k]!);
    }
    if (largest === 0) continue;
    for (const [k, row] of covariance.entries()) {
      for (const l of row.keys()) {
        row[l]! += direction[k]! * direction[l]! * (held / largest) ** 2;
      }
    }
  }
  return covariance;
}

/** Whether a parameter belongs to a direction that is not seen, and not by rounding alone. */
export function takesPart(direction: Float64Array, parameter: number): boolean {
  const largest = direction.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  return Math.abs(direction[parameter]!) > 1e-3 * largest;
}

function sumOf(matrices: readonly (readonly Float64Array[])[]): Float64Array[] {
  const [first = [], ...rest] = matrices;
  return first.map((row, k) =>
    row.map((value, l) => rest.reduce((sum, matrix) => sum + matrix[k]![l]!, value)),
  );
}
