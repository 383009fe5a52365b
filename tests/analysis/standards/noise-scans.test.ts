import { describe, expect, it } from 'vitest';
import { prepare, Refusal, type Sheet } from '../../../analysis/index.ts';
import { first, noFiles } from '../fitted.ts';
import { epsilonAt, normal, syntheticSheet, usual } from '../synthetic.ts';

const truth = { constant: 5e-4, transmittance: 3e-4 };

/** Scans of one cuvette at a largest absorbance, each with a baseline that has drifted. */
function scans(count: number, largest: number, points = 241): Sheet['noiseScans'] {
  const gauss = normal(9);
  const wavelengthNm = Array.from({ length: points }, (_, i) => 230 + i);
  const spectra = Array.from({ length: count }, (_, scan) => ({
    embedded: {
      name: `scan ${scan + 1}`,
      wavelengthNm,
      absorbance: wavelengthNm.map((nm) => {
        const absorbance = (largest / 27000) * epsilonAt(usual.bands.bis ?? [], nm);
        const sd = Math.hypot(truth.constant, truth.transmittance * 10 ** absorbance);
        return absorbance + 0.002 * scan + sd * gauss();
      }),
    },
  }));
  return [{ id: 'n1', spectra }];
}

function refusal(sheet: Sheet): Refusal {
  try {
    prepare(sheet, noFiles);
  } catch (error) {
    if (error instanceof Refusal) return error;
  }
  throw new Error('not refused');
}

describe('the noise from repeated scans', () => {
  it('is told in both parts, drift of the lamp left out', () => {
    const { fit } = first({ ...syntheticSheet(), noiseScans: scans(6, 1.2) ?? [] });
    expect(fit.noise.from).toBe('scans');
    // 1205 independent points: 5 % on a standard deviation that spans both parts, three of those
    expect(Math.abs(fit.noise.constant / truth.constant - 1)).toBeLessThan(0.15);
    expect(Math.abs(fit.noise.transmittance / truth.transmittance - 1)).toBeLessThan(0.15);
  });

  it('is not taken from blanks alone, which show one absorbance only', () => {
    const { fit } = first({ ...syntheticSheet(), noiseScans: scans(6, 0) ?? [] });
    expect(fit.noise.from).toBe('spectrum');
  });

  it('yields to a noise that the sheet states', () => {
    const sheet = syntheticSheet();
    const noise = { constant: 1e-3, transmittance: 0 };
    const { fit } = first({
      ...sheet,
      noiseScans: scans(3, 1) ?? [],
      fit: { ...sheet.fit, noise },
    });
    expect(fit.noise).toEqual({ ...noise, from: 'sheet' });
  });

  it('refuses scans that are not of the same points, or too short to tell', () => {
    const [long, short] = [scans(1, 1), scans(1, 1, 200)];
    const mixed = [
      { id: 'n1', spectra: [...(long?.[0]?.spectra ?? []), ...(short?.[0]?.spectra ?? [])] },
    ];
    expect(refusal({ ...syntheticSheet(), noiseScans: mixed }).code).toBe('noise-scans-unlike');
    const few = refusal({ ...syntheticSheet(), noiseScans: scans(2, 1, 20) ?? [] });
    expect(few.message).toContain('20 points');
  });
});
