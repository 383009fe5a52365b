import type { BudgetShare } from './results.ts';

/** Below this no single source is worth saying that it comes first. */
const worthWhile = 0.05;

/**
 * What to improve first, in a sentence: the source with the largest share of the variance, what half
 * of its uncertainty would do to the width of the interval (to first order: a share s leaves
 * √(1 - ¾ s)), and how to go about it. Null where there is no budget.
 */
export function budgetAdvice(budget: readonly BudgetShare[]): string | null {
  const largest = budget.reduce<BudgetShare | null>(
    (most, each) => (most === null || each.share > most.share ? each : most),
    null,
  );
  if (!largest || !(largest.share > 0)) return null;
  const { source, share } = largest;
  const { called, how, cannotBeHalved } = remedyOf(source);
  if (cannotBeHalved) {
    const part = share > 0.5 ? 'Most' : 'The largest part';
    return `${part} of the uncertainty is ${called}: ${how}.`;
  }
  const gain = 1 - Math.sqrt(1 - 0.75 * Math.min(share, 1));
  const percent = Math.max(Math.round(100 * gain), 1);
  if (gain < worthWhile) {
    return `No source stands out: halving the largest, the uncertainty of ${called}, would shrink the interval by ${percent} % only.`;
  }
  return `Halving the uncertainty of ${called} would shrink the interval by ${percent} %: ${how}.`;
}

interface Remedy {
  readonly called: string;
  readonly how: string;
  /** True where it is no spread that more care would halve. */
  readonly cannotBeHalved?: true;
}

function remedyOf(source: string): Remedy {
  const known = remedies[source];
  if (known) return known;
  for (const [start, how] of byBeginning) {
    if (source.startsWith(start)) return { called: source, how };
  }
  return { called: source, how: 'determine it anew with more care' };
}

/** By the names that `budgetOf` gives. */
const remedies: Readonly<Record<string, Remedy>> = {
  'photometric noise': {
    called: 'the photometric noise',
    how: 'average four scans, or dilute less so that the weak species absorb more',
  },
  'noise of the standards': {
    called: "the standards' noise",
    how: 'average four scans of each standard, or use stronger solutions',
  },
  baseline: {
    called: 'the price of fitting the baseline',
    how: 'record the blank with care and take a simpler baseline',
    cannotBeHalved: true,
  },
  'wavelength offset': {
    called: 'the price of fitting the wavelength offset',
    how: 'check the wavelength scale, and state how well it is known or leave the offset out',
    cannotBeHalved: true,
  },
  'stray light': {
    called: 'the price of fitting the stray light',
    how: "state the instrument's stray light, or dilute more",
    cannotBeHalved: true,
  },
  'lack of fit': {
    called: 'that the model does not describe the spectrum',
    how: 'look at the residual and the doubts first',
    cannotBeHalved: true,
  },
  'standards of the same shape': {
    called: 'that standards have the same shape in this window',
    how: 'widen the window to where they differ',
    cannotBeHalved: true,
  },
};

const byBeginning: readonly (readonly [string, string])[] = [
  ['stock ', 'weigh it anew, or make more stocks of that species'],
  ['dilution of ', 'make more solutions of that species, or dilute with better glassware'],
  ['scale of ', 'measure that standard again with a smaller uncertainty'],
  ['scatter between', 'find out which solution stands apart, and make it again'],
  ['factors between', 'average more scans of these standards, or use stronger solutions'],
  ['offsets of the standards', 'fit an offset, or record the blank of these standards with care'],
];
