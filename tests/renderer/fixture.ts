import { type Quantification, quantify, type Sheet } from '../../analysis/index.ts';
import type { PlotTheme } from '../../renderer/plots/theme.ts';
import type { SectionProps } from '../../renderer/sections/section.ts';
import { syntheticSheet } from '../analysis/synthetic.ts';

export const theme: PlotTheme = {
  isDark: false,
  ink: '#111111',
  soft: '#444444',
  faint: '#777777',
  rule: '#dddddd',
  paper: '#ffffff',
  well: '#eeeeee',
  doubt: '#7a4a00',
  font: 'sans-serif',
};

/** Three invented species, a window, a range left out, and a band without a standard. */
export function doubtfulSheet(): Sheet {
  return {
    ...syntheticSheet({ extra: (nm) => 0.02 * Math.exp(-0.5 * ((nm - 400) / 6) ** 2) }),
    fit: { windowNm: [260, 440], excludeNm: [[300, 304]] },
  };
}

/** What a section is given for a sheet, computed by the real analysis. */
export function propsOf(sheet: Sheet, aliquot: string | null): SectionProps {
  return propsWith(sheet, aliquot, quantify(sheet, new Map()));
}

export function propsWith(
  sheet: Sheet,
  aliquot: string | null,
  quantification: Quantification | null,
  obstacle: string | null = null,
): SectionProps {
  const fault = (): never => {
    throw new Error('a summary changes nothing');
  };
  return { sheet, quantification, obstacle, aliquot, change: fault, chooseAliquot: fault };
}

/** Where a trace of a figure is at one of its points. */
export function yAt(trace: unknown, at: number): number {
  if (typeof trace !== 'object' || trace === null || !('y' in trace)) {
    throw new Error('there is no such trace');
  }
  if (!(trace.y instanceof Float64Array)) throw new Error('the trace has no numbers');
  return trace.y[at] ?? Number.NaN;
}
