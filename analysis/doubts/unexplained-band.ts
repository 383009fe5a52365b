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

/** What a band of that place, width and height does to the amounts: the fit's own gain on it. */
function effectText({ crude, unmixing, nameOf }: Evidence, band: FoundBand): string {
  const { at, fit, amounts, species } = unmixing;
  const moved = species.flatMap((id, k) => {
    const gain = fit.gain[k];
    const amount = amounts[k] ?? 0;
    if (!gain || !(amount > 0)) return [];
    let bias = 0;
    for (const [j, i] of at.entries()) {
      const distance = ((crude.wavelengthNm[i] ?? 0) - band.nm) / band.widthNm;
      bias += gain[j]! * band.height * Math.exp(-0.5 * distance * distance);
    }
    const share = bias / amount;
    if (Math.abs(share) < shareOfNote) return [];
    return [
      `${nameOf(id)} ${share > 0 ? 'too high' : 'too low'} by some ${percentText(Math.abs(share))}`,
    ];
  });
  return moved.length === 0
    ? 'A band of this kind hardly moves the amounts, but another part of the same species may.'
    : `A band of this kind makes ${listText(moved)}; what else the species absorbs comes on top, so the interval does not hold.`;
}

/** What interpolation and rounding can leave behind moves no answer: a thousandth of the signal, four times the noise, or 0.1 mAU. */
function heightOfNote({ unmixing: { fit, noise } }: Evidence): number {
  const least = Math.max(1e-4, 4 * noise.constant);
  return fit.fitted.reduce((most, value) => Math.max(most, 1e-3 * value), least);
}
