import { dot } from '../spectrum/vectors.ts';
import type { FoundBand } from '../unmixing/noise-of-fit.ts';
import type { DoubtTest, Evidence } from './evidence.ts';
import { listText, nmText, percentText, twoFigures } from './wording.ts';

/** Smaller relative changes of an amount are not worth a word. */
const shareOfNote = 0.01;

/**
 * Matched-filter scan of the whitened residual (`band-scan.ts`): a Gaussian band at every place and of
 * several widths, made orthogonal to the model and to a wavelength offset (which would else be taken for
 * a band), against the noise with its correlation from point to point. At most 1 % of spectra of
 * which the model is right raise it.
 */
export const unexplainedBand: DoubtTest = (evidence) => {
  const { crude, unmixing } = evidence;
  const best = unmixing.band;
  if (!best || Math.abs(best.size) <= best.limit) return [];
  if (Math.abs(best.height) < heightOfNote(evidence)) return [];
  const [lowest, highest] = [unmixing.at[0], unmixing.at.at(-1)].map(
    (i) => crude.wavelengthNm[i ?? 0] ?? 0,
  );
  const [low, high] = [best.nm - 2 * best.widthNm, best.nm + 2 * best.widthNm];
  const over = best.height > 0;
  return [
    {
      code: 'unexplained-band',
      message:
        `The residual holds a band near ${nmText(best.nm)} nm (about ${twoFigures(Math.abs(best.height) * 1000)} mAU ${over ? 'over' : 'under'} the fit, ${twoFigures(Math.abs(best.size))} times what noise would do): ` +
        `something absorbs that has no standard here, or a standard differs from what is in the flask. ${effectText(evidence, best)} ` +
        'Add the species if you know it (a by-product, the solvent), exclude that range, or look for it by chromatography.',
      atNm: [Math.max(low, lowest ?? low), Math.min(high, highest ?? high)],
    },
  ];
};

/** What such a band does to the amounts where it was seen, and to the ratio wherever else it may absorb. */
function effectText(evidence: Evidence, band: FoundBand): string {
  const { unmixing, nameOf } = evidence;
  const here = biasOf(evidence, band, band.nm);
  const moved = unmixing.species.flatMap((id, k) => {
    const amount = unmixing.amounts[k] ?? 0;
    const share = (here[k] ?? 0) / amount;
    if (!(amount > 0) || Math.abs(share) < shareOfNote) return [];
    return [
      `${nameOf(id)} ${share > 0 ? 'too high' : 'too low'} by some ${percentText(Math.abs(share))}`,
    ];
  });
  const seen =
    moved.length === 0
      ? 'A band of this kind hardly moves the amounts, but another part of the same species may.'
      : `A band of this kind makes ${listText(moved)}; what else the species absorbs comes on top, so the interval does not hold.`;
  return [seen, ...ratioRange(evidence, band)].join(' ');
}

/** Within which the first ratio could lie if as strong a band stood anywhere in the window, hidden by the fit. */
function ratioRange(evidence: Evidence, band: FoundBand): string[] {
  const { crude, unmixing, products, nameOf } = evidence;
  const [of, to] = products;
  if (of === undefined || to === undefined) return [];
  const [a, b] = [unmixing.amounts[of] ?? 0, unmixing.amounts[to] ?? 0];
  if (!(a > 0) || !(b > 0)) return [];
  const [lowest, highest] = [unmixing.at[0], unmixing.at.at(-1)].map(
    (i) => crude.wavelengthNm[i ?? 0] ?? 0,
  );
  let largest = 0;
  for (let nm = lowest ?? 0; nm <= (highest ?? 0); nm += band.widthNm / 2) {
    const bias = biasOf(evidence, band, nm);
    largest = Math.max(largest, Math.abs((bias[of] ?? 0) / a - (bias[to] ?? 0) / b));
  }
  const names = `${nameOf(unmixing.species[of] ?? '')} : ${nameOf(unmixing.species[to] ?? '')}`;
  const [low, high] = [(a / b) * Math.exp(-largest), (a / b) * Math.exp(largest)];
  return [`The ratio ${names} could lie from ${twoFigures(low)} to ${twoFigures(high)}.`];
}

/** Change of each amount by a band of that height and width at a place, mol/L: the fit's own gain on it. */
function biasOf(
  { crude, unmixing: { at, fit, species } }: Evidence,
  { height, widthNm }: FoundBand,
  place: number,
): number[] {
  const shape = Float64Array.from(at, (i) => {
    const distance = ((crude.wavelengthNm[i] ?? 0) - place) / widthNm;
    return height * Math.exp(-0.5 * distance * distance);
  });
  return species.map((_, k) => dot(fit.gain[k] ?? new Float64Array(shape.length), shape));
}

/** What interpolation and rounding can leave behind moves no answer: a thousandth of the signal, four times the noise, or 0.1 mAU. */
function heightOfNote({ unmixing: { fit, noise } }: Evidence): number {
  const least = Math.max(1e-4, 4 * noise.constant);
  return fit.fitted.reduce((most, value) => Math.max(most, 1e-3 * value), least);
}
