import type { Data, Layout } from 'plotly.js-dist-min';
import type { AliquotCurves, Doubt } from '../../analysis/index.ts';
import type { PlotTheme } from './theme.ts';
import type { RangeNm } from './zoom-range.ts';

/** What plotly draws; its size is set where it is drawn. */
export interface Figure {
  readonly data: Data[];
  readonly layout: Partial<Layout>;
}

/** All that the fit plot is drawn from. */
export interface FitFigureInput {
  /** Short names of the species by id. */
  readonly labels: ReadonlyMap<string, string>;
  readonly excludeNm: readonly RangeNm[];
  readonly curves: AliquotCurves;
  readonly doubts: readonly Doubt[];
  readonly theme: PlotTheme;
  readonly rangeNm: RangeNm;
  /** Of the whole plot. */
  readonly widthPx: number;
  readonly heightPx: number;
}
