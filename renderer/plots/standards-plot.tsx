import { useCallback, useRef } from 'preact/hooks';
import { numberText, type Sheet, type StandardCurves, speciesLabel } from '../../analysis/index.ts';
import { PlotFrame } from './plot-frame.tsx';
import { useLabels } from './species-labels.ts';
import { sameStandards, standardsFigure, standardsRange } from './standards-figure.ts';
import type { PlotTheme } from './theme.ts';
import { tableRows, thinningText } from './thinned.ts';
import { useZoom, ZoomControls } from './zoom.tsx';

interface StandardsPlotProps {
  readonly standards: readonly StandardCurves[];
  readonly sheet: Sheet;
}

const height = 300;

/** Molar absorptivity of each species, with each solution by itself as a thin line behind. */
export function StandardsPlot({ standards, sheet }: StandardsPlotProps) {
  // every answer brings new arrays; they seldom hold anything new
  const kept = useRef(standards);
  if (!sameStandards(kept.current, standards)) kept.current = standards;
  const shown = kept.current;
  const labels = useLabels(sheet);
  const zoom = useZoom(standardsRange(shown));
  const [low, high] = zoom.range;
  const figure = useCallback(
    (widthPx: number, theme: PlotTheme) =>
      standardsFigure({
        standards: shown,
        labels,
        theme,
        rangeNm: [low, high],
        widthPx,
        heightPx: height,
      }),
    [shown, labels, low, high],
  );
  return (
    <PlotFrame
      label="Molar absorptivity of the standards against wavelength"
      name="standards"
      height={height}
      figure={figure}
      onZoom={zoom.onZoom}
      controls={<ZoomControls {...zoom} />}
      table={() => <StandardsTable standards={shown} sheet={sheet} />}
    />
  );
}

function StandardsTable({ standards, sheet }: StandardsPlotProps) {
  const points = Math.max(0, ...standards.map(({ wavelengthNm }) => wavelengthNm.length));
  return (
    <table class="ledger numbers">
      <caption>Molar absorptivity, L mol⁻¹ cm⁻¹; {thinningText(points).toLowerCase()}</caption>
      <thead>
        <tr>
          <th scope="col">species</th>
          <th scope="col">nm</th>
          <th scope="col">ε</th>
          <th scope="col">point noise (1 σ)</th>
        </tr>
      </thead>
      <tbody>
        {standards.flatMap(({ species, wavelengthNm, molarAbsorptivity, noiseSd }) =>
          tableRows(wavelengthNm.length).map((i) => (
            <tr key={`${species}-${i}`}>
              <td>{speciesLabel(sheet, species)}</td>
              <td>{wavelengthNm[i]}</td>
              <td>{numberText(molarAbsorptivity[i] ?? Number.NaN, 0)}</td>
              <td>{numberText(noiseSd[i] ?? Number.NaN, 1)}</td>
            </tr>
          )),
        )}
      </tbody>
    </table>
  );
}
