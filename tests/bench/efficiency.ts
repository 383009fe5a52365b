import { absorbanceVariance } from '../../analysis/spectrum/noise.ts';
import { factorise } from '../../analysis/unmixing/orthogonal.ts';
import { bands, type Conditions, simulated, usual } from '../analysis/simulated.ts';
import { epsilonAt } from '../analysis/synthetic.ts';
import { redrawn } from './redraw.ts';

const species = ['arm', 'mono', 'bis'] as const;

/**
 * Variance of the mono amount against weighted least squares with the exact noise at every point,
 * paired on the same draws, the standards exact; beside it the Cramér-Rao bound of the points'
 * means and what unweighted least squares attains.
 */
export function efficiency(draws: number): void {
  console.log(
    `Efficiency: variance with exact weights over variance attained, mono amount, ${draws} paired draws`,
  );
  console.log('  absorbance  noise given  noise estimated  unweighted  bound over exact');
  for (const absorbance of [0.1, 0.5, 0.8, 1.3, 1.7]) {
    const conditions = { absorbance, exactStandards: true };
    const exact = linear(draws, conditions, 'exact');
    const plain = linear(draws, conditions, 'unweighted');
    const given = ours(draws, { ...conditions, noiseStated: true });
    const estimated = ours(draws, { ...conditions, noiseStated: false });
    const of = variance(exact.estimates);
    const shown = [
      of / variance(given),
      of / variance(estimated),
      of / variance(plain.estimates),
      exact.bound / of,
    ].map((value) => value.toFixed(3));
    console.log(
      `  ${String(absorbance).padStart(10)}  ${shown[0]?.padStart(11)}  ${shown[1]?.padStart(15)}  ${shown[2]?.padStart(10)}  ${shown[3]?.padStart(16)}`,
    );
  }
}

function ours(draws: number, changes: Partial<Conditions>): number[] {
  return Array.from(redrawn(draws, changes), ({ result }) => {
    const mono = result.concentrations.find((each) => each.species === 'mono');
    return mono?.cuvetteMolPerL.value ?? Number.NaN;
  });
}

/** Least squares on the true spectra, weights from the true absorbance or none. */
function linear(
  draws: number,
  changes: Partial<Conditions>,
  weights: 'exact' | 'unweighted',
): { estimates: number[]; bound: number } {
  const { noise } = usual;
  let bound = Number.NaN;
  const estimates = Array.from({ length: draws }, (_, index) => {
    const { sheet, truth } = simulated({ ...changes, seed: index + 1 });
    const embedded = sheet.aliquots?.[0]?.spectrum.embedded;
    if (!embedded) throw new Error('no spectrum');
    const inside = embedded.wavelengthNm.flatMap((nm, i) => (nm >= 240 && nm <= 450 ? [i] : []));
    const nm = Float64Array.from(inside, (i) => embedded.wavelengthNm[i] ?? Number.NaN);
    const measured = Float64Array.from(inside, (i) => embedded.absorbance?.[i] ?? Number.NaN);
    const columns = species.map((name) => nm.map((at) => epsilonAt(bands[name], at)));
    const sd = nm.map((_at, i) => {
      if (weights === 'unweighted') return 1;
      const absorbance = species.reduce(
        (sum, name, k) => sum + truth[name] * (columns[k]?.[i] ?? 0),
        0,
      );
      return Math.sqrt(absorbanceVariance(noise, absorbance));
    });
    const whitened = [...columns, new Float64Array(nm.length).fill(1)].map((column) =>
      column.map((value, i) => value / (sd[i] ?? 1)),
    );
    const factors = factorise(whitened);
    const mono = factors.pseudoInverse()[1];
    bound = mono ? mono.reduce((sum, value) => sum + value * value, 0) : Number.NaN;
    return factors.solve(measured.map((value, i) => value / (sd[i] ?? 1)))[1] ?? Number.NaN;
  });
  return { estimates, bound };
}

function variance(values: readonly number[]): number {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  return values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1);
}
