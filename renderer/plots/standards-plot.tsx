import type { Annotation, Data, Layout } from 'plotly.js-dist-min';
import { useMemo } from 'preact/hooks';
import {
  numberText,
  type Sheet,
  type StandardCurves,
  speciesLabel,
  speciesLook,
} from '../../analysis/index.ts';
import { dashOf } from './fit-figure.ts';
import { PlotFrame } from './plot-frame.tsx';
import { type PlotTheme, plotTheme } from './theme.ts';

interface StandardsPlotProps {
  readonly standards: readonly StandardCurves[];
  readonly sheet: Sheet;
}

const height = 300;
const mostRows = 60;

/** Molar absorptivity of each species, with each solution by itself as a thin line behind. */
export function StandardsPlot({ standards, sheet }: StandardsPlotProps) {
  const theme = plotTheme.value;
  const { data, layout } = useMemo(
    () => standardsFigure(standards, sheet, theme),
    [standards, sheet, theme],
  );
  return (
    <PlotFrame
      label="Molar absorptivity of the standards against wavelength"
      name="standards"
      height={height}
      data={data}
      layout={layout}
      table={() => <StandardsTable standards={standards} sheet={sheet} />}
    />
  );
}

export function standardsFigure(
  standards: readonly StandardCurves[],
  sheet: Sheet,
  theme: PlotTheme,
): { readonly data: Data[]; readonly layout: Partial<Layout> } {
  const colourOf = (k: number): string =>
    theme.isDark ? speciesLook(k).darkColour : speciesLook(k).colour;
  const solutions = standards.flatMap((standard, k) =>
    standard.solutions.map(
      ({ standard: id, wavelengthNm, molarAbsorptivity }): Data => ({
        type: 'scatter',
        mode: 'lines',
        x: wavelengthNm,
        y: molarAbsorptivity,
        line: { width: 0.8, color: `${colourOf(k)}73` },
        hoverinfo: 'skip',
        name: id,
      }),
    ),
  );
  const combined = standards.map(
    ({ species, wavelengthNm, molarAbsorptivity }, k): Data => ({
      type: 'scatter',
      mode: 'lines',
      x: wavelengthNm,
      y: molarAbsorptivity,
      line: { width: 1.8, color: colourOf(k), dash: dashOf(k) },
      name: speciesLabel(sheet, species),
      hovertemplate: '%{y:.0f}',
    }),
  );
  const axis = {
    color: theme.soft,
    gridcolor: theme.rule,
    zeroline: false,
    ticks: 'outside' as const,
    ticklen: 4,
    tickcolor: theme.rule,
    title: { font: { size: 12 }, standoff: 6 },
  };
  return {
    data: [...solutions, ...combined],
    layout: {
      margin: { l: 64, r: 18, t: 14, b: 44 },
      paper_bgcolor: 'rgba(0,0,0,0)',
      plot_bgcolor: 'rgba(0,0,0,0)',
      font: { family: theme.font, size: 12, color: theme.soft },
      showlegend: false,
      hovermode: 'x unified',
      hoverlabel: {
        bgcolor: theme.paper,
        bordercolor: theme.rule,
        font: { color: theme.ink, size: 12 },
      },
      xaxis: {
        ...axis,
        showgrid: false,
        hoverformat: '.1f',
        title: { ...axis.title, text: 'wavelength, nm' },
      },
      yaxis: { ...axis, rangemode: 'tozero', title: { ...axis.title, text: 'ε, L mol⁻¹ cm⁻¹' } },
      annotations: peakLabels(standards, sheet, theme, colourOf),
    },
  };
}

/** The name of each species at its highest point right of the steep short-wave end. */
function peakLabels(
  standards: readonly StandardCurves[],
  sheet: Sheet,
  theme: PlotTheme,
  colourOf: (k: number) => string,
): Partial<Annotation>[] {
  return standards.flatMap(({ species, wavelengthNm, molarAbsorptivity }, k) => {
    const from = Math.floor(wavelengthNm.length * 0.12);
    let best = -1;
    for (let i = from; i < wavelengthNm.length; i++) {
      const value = molarAbsorptivity[i] ?? Number.NaN;
      const isPeak =
        value >= (molarAbsorptivity[i - 1] ?? Number.NaN) &&
        value >= (molarAbsorptivity[i + 1] ?? Number.NaN);
      if (isPeak && (best === -1 || value > (molarAbsorptivity[best] ?? 0))) best = i;
    }
    if (best === -1) return [];
    return [
      {
        x: wavelengthNm[best] ?? 0,
        y: molarAbsorptivity[best] ?? 0,
        text: speciesLabel(sheet, species),
        showarrow: false,
        yshift: 10,
        bgcolor: `${theme.paper}b3`,
        font: { size: 12, weight: 600, color: colourOf(k) },
      },
    ];
  });
}

function StandardsTable({ standards, sheet }: StandardsPlotProps) {
  return (
    <table class="ledger numbers">
      <caption>Molar absorptivity, L mol⁻¹ cm⁻¹</caption>
      <thead>
        <tr>
          <th scope="col">species</th>
          <th scope="col">nm</th>
          <th scope="col">ε</th>
          <th scope="col">point noise (1 σ)</th>
        </tr>
      </thead>
      <tbody>
        {standards.flatMap(({ species, wavelengthNm, molarAbsorptivity, noiseSd }) => {
          const every = Math.max(1, Math.ceil(wavelengthNm.length / mostRows));
          return Array.from(wavelengthNm.keys())
            .filter((i) => i % every === 0)
            .map((i) => (
              <tr key={`${species}-${i}`}>
                <td>{speciesLabel(sheet, species)}</td>
                <td>{wavelengthNm[i]}</td>
                <td>{numberText(molarAbsorptivity[i] ?? Number.NaN, 0)}</td>
                <td>{numberText(noiseSd[i] ?? Number.NaN, 1)}</td>
              </tr>
            ));
        })}
      </tbody>
    </table>
  );
}
