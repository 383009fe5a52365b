import type { Dash } from 'plotly.js-dist-min';
import { speciesLook } from '../../analysis/index.ts';
import type { PlotTheme } from './theme.ts';

/** The colour of a species by its place among the absorbing ones, for the theme that is on. */
export function speciesColour(index: number, { isDark }: Pick<PlotTheme, 'isDark'>): string {
  const { colour, darkColour } = speciesLook(index);
  return isDark ? darkColour : colour;
}

/** Its line pattern, the same lengths as in print: "8px,3px". */
export function speciesDash(index: number): Dash {
  const { dash } = speciesLook(index);
  if (dash === '') return 'solid';
  const lengths = dash.split(' ').map((length) => `${length}px`);
  // plotly takes a list of lengths; its type knows the named patterns only
  return lengths.join(',') as Dash;
}
