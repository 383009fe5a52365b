import { useCallback } from 'preact/hooks';
import type { AliquotCurves, Doubt, Sheet } from '../../analysis/index.ts';
import { CurvesTable } from './curves-table.tsx';
import { fitFigure, fitMargin } from './fit-figure.ts';
import { PlotFrame } from './plot-frame.tsx';
import { useLabels } from './species-labels.ts';
import type { PlotTheme } from './theme.ts';
import { WindowHandles } from './window-handles.tsx';
import { useZoom, ZoomControls } from './zoom.tsx';
import type { RangeNm } from './zoom-range.ts';

interface FitPlotProps {
  readonly sheet: Sheet;
  /** Without contributions: what was measured, not fitted. */
  readonly curves: AliquotCurves;
  readonly doubts: readonly Doubt[];
  readonly windowNm: RangeNm;
  readonly onWindow: (windowNm: RangeNm, gesture: string) => void;
}

const height = 480;
/** Room at both ends of the spectrum, for the handles. */
const roomNm = 4;
const noRanges: readonly RangeNm[] = [];

/** The crude spectrum taken apart, with the edges of the fit window to take hold of. */
export function FitPlot({ sheet, curves, doubts, windowNm, onWindow }: FitPlotProps) {
  const { wavelengthNm } = curves;
  const [first, last] = [wavelengthNm[0] ?? 0, wavelengthNm.at(-1) ?? 1];
  const zoom = useZoom([first - roomNm, last + roomNm]);
  const [low, high] = zoom.range;
  const excludeNm = sheet.fit?.excludeNm ?? noRanges;
  const labels = useLabels(sheet);
  // not the sheet itself: it is another one at every step of a drag, long before there is another fit
  const figure = useCallback(
    (widthPx: number, theme: PlotTheme) =>
      fitFigure({
        labels,
        excludeNm,
        curves,
        doubts,
        theme,
        rangeNm: [low, high],
        widthPx,
        heightPx: height,
      }),
    [labels, excludeNm, curves, doubts, low, high],
  );
  const margin = fitMargin(doubts, zoom.range);
  return (
    <PlotFrame
      label={labelOf(curves)}
      name={`fit-${curves.aliquot}`}
      height={height}
      figure={figure}
      onZoom={zoom.onZoom}
      controls={<ZoomControls {...zoom} />}
      table={() => <CurvesTable sheet={sheet} curves={curves} />}
      pictureShapes={(theme) =>
        windowNm.map((nm) => ({
          type: 'line',
          xref: 'x',
          yref: 'paper',
          x0: nm,
          x1: nm,
          y0: 0,
          y1: 1,
          line: { color: theme.soft, width: 1 },
        }))
      }
      overlay={(width) => (
        <WindowHandles
          windowNm={windowNm}
          limitsNm={[Math.ceil(first), Math.floor(last)]}
          rangeNm={zoom.range}
          left={margin.l}
          width={width - margin.l - margin.r}
          top={margin.t}
          height={height - margin.t - margin.b}
          onMove={onWindow}
        />
      )}
    />
  );
}

function labelOf({ aliquot, contributions }: AliquotCurves): string {
  return contributions.length === 0
    ? `Aliquot ${aliquot}: measured absorbance, not fitted`
    : `Fit of aliquot ${aliquot}: measured absorbance on the contributions of the species, and the residual`;
}
