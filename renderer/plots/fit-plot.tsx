import { useMemo, useState } from 'preact/hooks';
import {
  type AliquotCurves,
  type Doubt,
  leftOut,
  numberText,
  type Sheet,
  speciesName,
} from '../../analysis/index.ts';
import { fitFigure, margin } from './fit-figure.ts';
import { PlotFrame } from './plot-frame.tsx';
import { plotTheme } from './theme.ts';
import { WindowHandles } from './window-handles.tsx';

interface FitPlotProps {
  readonly sheet: Sheet;
  readonly curves: AliquotCurves;
  readonly doubts: readonly Doubt[];
  readonly windowNm: readonly [number, number];
  readonly onWindow: (windowNm: readonly [number, number], gesture: string) => void;
}

const height = 470;
const mostRows = 60;

/** The crude spectrum taken apart, with the edges of the fit window to take hold of. */
export function FitPlot({ sheet, curves, doubts, windowNm, onWindow }: FitPlotProps) {
  const theme = plotTheme.value;
  const { wavelengthNm } = curves;
  const all = [wavelengthNm[0] ?? 0, wavelengthNm.at(-1) ?? 1] as const;
  const [zoomed, setZoomed] = useState<readonly [number, number] | null>(null);
  const [low, high] = zoomed ?? [all[0] - 4, all[1] + 4];
  const figure = useMemo(
    () => fitFigure({ sheet, curves, doubts, theme, rangeNm: [low, high] }),
    [sheet, curves, doubts, theme, low, high],
  );
  return (
    <PlotFrame
      label={`Fit of aliquot ${curves.aliquot}: measured absorbance on the contributions of the species, and the residual`}
      name={`fit-${curves.aliquot}`}
      height={height}
      data={figure.data}
      layout={figure.layout}
      onZoom={setZoomed}
      table={() => <CurvesTable sheet={sheet} curves={curves} />}
      controls={
        zoomed && (
          <button type="button" class="quiet" onClick={() => setZoomed(null)}>
            Show all wavelengths
          </button>
        )
      }
      overlay={(width) => (
        <WindowHandles
          windowNm={windowNm}
          limitsNm={[Math.ceil(all[0]), Math.floor(all[1])]}
          rangeNm={[low, high]}
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

const reasons: Readonly<Record<number, string>> = {
  [leftOut.used]: 'used',
  [leftOut.outsideWindow]: 'outside the window',
  [leftOut.excluded]: 'excluded',
  [leftOut.missing]: 'over range or missing',
  [leftOut.aboveUpperAbsorbance]: 'above the upper absorbance',
  [leftOut.noStandard]: 'no standard there',
};

function CurvesTable({ sheet, curves }: Pick<FitPlotProps, 'sheet' | 'curves'>) {
  const { wavelengthNm, measured, fitted, contributions, residual, use } = curves;
  const every = Math.max(1, Math.ceil(wavelengthNm.length / mostRows));
  const rows = Array.from(wavelengthNm.keys()).filter((i) => i % every === 0);
  const text = (value: number | undefined, decimals: number): string =>
    value === undefined || Number.isNaN(value) ? '' : numberText(value, decimals);
  return (
    <table class="ledger numbers">
      <caption>
        {every === 1 ? 'Every point' : `Every ${every}th point of ${wavelengthNm.length}`}
      </caption>
      <thead>
        <tr>
          <th scope="col">nm</th>
          <th scope="col">measured</th>
          <th scope="col">fitted</th>
          {contributions.map(({ species }) => (
            <th scope="col" key={species}>
              {speciesName(sheet, species)}
            </th>
          ))}
          <th scope="col">residual, mAU</th>
          <th scope="col">point</th>
        </tr>
      </thead>
      <tbody>
        {rows.map((i) => (
          <tr key={i}>
            <td>{wavelengthNm[i]}</td>
            <td>{text(measured[i], 4)}</td>
            <td>{text(fitted[i], 4)}</td>
            {contributions.map(({ species, absorbance }) => (
              <td key={species}>{text(absorbance[i], 4)}</td>
            ))}
            <td>{text(1000 * (residual[i] ?? Number.NaN), 2)}</td>
            <td>{reasons[use[i] ?? 0]}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
