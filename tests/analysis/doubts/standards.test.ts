import { describe, expect, it } from 'vitest';
import type { Sheet } from '../../../analysis/index.ts';
import { withStrayLight } from '../../../analysis/spectrum/stray-light.ts';
import { first } from '../fitted.ts';
import { epsilonAt, normal, syntheticSheet, usual } from '../synthetic.ts';

interface Made {
  readonly peak: number;
  readonly offset?: number;
  readonly strayLight?: number;
  /** Relative error of the concentration that the sheet states. */
  readonly mistake?: number;
}

/** The synthetic sheet with these solutions of mono in place of its own. */
function withMono(made: readonly Made[], fit: Sheet['fit'] = {}, mono = 2e-5): Sheet {
  const sheet = syntheticSheet({ aliquots: [{ arm: 8e-6, mono, bis: 1.2e-5 }] });
  const gauss = normal(9);
  const bands = usual.bands.mono ?? [];
  const wavelengthNm = Array.from({ length: 241 }, (_, i) => 230 + i);
  const standards = made.map(({ peak, offset = 0, strayLight = 0, mistake = 0 }, i) => {
    const concentration = peak / 16000;
    return {
      id: `M${i + 1}`,
      species: 'mono',
      stock: 'mono-A',
      relativeStandardUncertainty: 0.003,
      concentrationMolPerL: concentration * (1 + mistake),
      spectrum: {
        embedded: {
          name: `M${i + 1}`,
          wavelengthNm,
          absorbance: wavelengthNm.map((nm) => {
            const shown = withStrayLight(concentration * epsilonAt(bands, nm), strayLight) + offset;
            return shown + Math.hypot(3e-4, 2e-4 * 10 ** shown) * gauss();
          }),
        },
      },
    };
  });
  return {
    ...sheet,
    fit: { ...sheet.fit, ...fit },
    standards: [
      ...(sheet.standards ?? []).filter(({ species }) => species !== 'mono'),
      ...standards,
    ],
  };
}

function messages(sheet: Sheet, code: string): string[] {
  return first(sheet)
    .doubts.filter((doubt) => doubt.code === code)
    .map(({ message }) => message);
}

const three = [{ peak: 0.3 }, { peak: 0.6 }, { peak: 0.9 }];

describe('the doubt nonlinear-standard', () => {
  it('is silent on three solutions that agree, one of them offset by 20 mAU', () => {
    expect(messages(withMono(three), 'nonlinear-standard')).toEqual([]);
    const offset = [{ peak: 0.3 }, { peak: 0.6, offset: 0.02 }, { peak: 0.9 }];
    expect(messages(withMono(offset), 'nonlinear-standard')).toEqual([]);
  });

  it('names the one of three that stands apart, which way and how much', () => {
    const [message] = messages(
      withMono([{ peak: 0.3 }, { peak: 0.6, mistake: 0.08 }, { peak: 0.9 }]),
      'nonlinear-standard',
    );
    // 1/1.08: 7.4 % below
    expect(message).toMatch(/M2 of mono stands apart: .* 7\.\d % below/);
    expect(message).toContain('make it again');
  });

  it('says of two that it cannot tell which', () => {
    const [message] = messages(
      withMono([{ peak: 0.4, mistake: 0.08 }, { peak: 0.9 }]),
      'nonlinear-standard',
    );
    expect(message).toContain('two cannot tell');
    expect(message).toContain('make a third');
  });

  it('sees stray light in the standards, from where, and what would mend it', () => {
    const strayLight = 1e-3;
    const strong = [0.3, 0.6, 1.2, 1.8].map((peak) => ({ peak, strayLight }));
    const [message] = messages(withMono(strong), 'nonlinear-standard');
    expect(message).toContain('too low');
    expect(message).toMatch(/above an absorbance of 1\.\d/);
    expect(message).toContain('state the stray light');
  });

  it('with no baseline in the fit, says of two that differ by a constant that it goes into the amount', () => {
    const pair = [{ peak: 0.4, offset: 0.01 }, { peak: 0.9 }];
    expect(messages(withMono(pair), 'nonlinear-standard')).toEqual([]);
    const [message] = messages(withMono(pair, { baseline: 'none' }), 'nonlinear-standard');
    expect(message).toContain('differ by a constant');
  });
});

describe('the doubt beyond-standards', () => {
  it('is silent within, and speaks of a contribution past the strongest standard', () => {
    expect(messages(withMono(three), 'beyond-standards')).toEqual([]);
    // 1.5 against 0.9
    const [message] = messages(withMono(three, {}, 9.4e-5), 'beyond-standards');
    expect(message).toContain('up to 1.5');
    expect(message).toContain('go up to 0.90');
  });

  it('counts standards only up to where they were seen to be straight', () => {
    const strayLight = 1e-3;
    const bent = [0.3, 0.6, 1.2, 1.8].map((peak) => ({ peak, strayLight }));
    const [message] = messages(withMono(bent, {}, 1.05e-4), 'beyond-standards');
    expect(message).toContain('bend above');
  });
});
