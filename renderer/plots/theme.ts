import { signal } from '@preact/signals';

/** The tokens as plotly needs them: it drops CSS variables in silence, so they are resolved here. */
export interface PlotTheme {
  readonly isDark: boolean;
  readonly ink: string;
  readonly soft: string;
  readonly faint: string;
  readonly rule: string;
  readonly paper: string;
  readonly well: string;
  readonly doubt: string;
  readonly font: string;
}

const dark = window.matchMedia('(prefers-color-scheme: dark)');

export const plotTheme = signal<PlotTheme>(resolved());
dark.addEventListener('change', () => {
  plotTheme.value = resolved();
});

/** As on paper, whatever the screen's theme: a picture goes into a document. */
export function paperTheme(): PlotTheme {
  const root = document.documentElement;
  const before = root.dataset.theme;
  root.dataset.theme = 'light';
  try {
    return { ...resolved(), isDark: false };
  } finally {
    if (before === undefined) delete root.dataset.theme;
    else root.dataset.theme = before;
  }
}

function resolved(): PlotTheme {
  const style = getComputedStyle(document.documentElement);
  const token = (name: string): string => style.getPropertyValue(name).trim();
  return {
    isDark: dark.matches,
    ink: token('--ink'),
    soft: token('--ink-soft'),
    faint: token('--ink-faint'),
    rule: token('--rule'),
    paper: token('--paper'),
    well: token('--well'),
    doubt: token('--doubt'),
    font: token('--font'),
  };
}
