import { type AliquotResult, fitSettings, setFit } from '../../../analysis/index.ts';
import { FitPlot } from '../../plots/fit-plot.tsx';
import type { SectionProps } from '../section.ts';
import { AliquotPicker } from './aliquot-picker.tsx';
import { FitFields } from './fit-fields.tsx';
import { FitFigures } from './fit-figures.tsx';
import { measuredCurves } from './measured-curves.ts';
import { MissingSpectrumPanel } from './missing-spectrum.tsx';
import { whyNotFitted } from './why-not-fitted.ts';
import { WindowMapPanel } from './window-map.tsx';

export { fitSummary } from './fit-summary.ts';

/** The aliquot that is shown, taken apart, with the settings of the fit and its figures. */
export function FitSection(props: SectionProps) {
  const { sheet, quantification, aliquot, change } = props;
  if ((sheet.aliquots ?? []).length === 0)
    return <p class="empty">The fit appears here once there is a crude spectrum.</p>;
  const result = quantification?.results.aliquots.find((each) => each.aliquot === aliquot);
  const fitted = quantification?.curves.find((each) => each.aliquot === aliquot);
  // a window too narrow to be fitted must not take away the plot on which it can be widened
  const curves = fitted ?? measuredCurves(sheet, aliquot);
  const limits = curves && ([curves.wavelengthNm[0], curves.wavelengthNm.at(-1)] as const);
  const [low, high] = fitSettings(sheet).windowNm ?? result?.fit.windowNm ?? limits ?? [];
  const trouble = whyNotFitted(props);
  const withBand = (quantification?.results.aliquots ?? []).filter(hasUnexplainedBand);
  return (
    <>
      <AliquotPicker {...props} />
      {curves && low !== undefined && high !== undefined && (
        <FitPlot
          sheet={sheet}
          curves={curves}
          doubts={result?.doubts ?? noDoubts}
          windowNm={[low, high]}
          onWindow={(windowNm, gesture) =>
            change('move the window', (before) => setFit(before, { windowNm }), gesture)
          }
        />
      )}
      {trouble !== null && (
        <p class="obstacle" role="status">
          {trouble}
          {curves && ' The plot shows what was measured, without a fit.'}
        </p>
      )}
      <div class="fit-lower">
        <FitFields sheet={sheet} change={change} low={low} high={high} />
        {result && <FitFigures sheet={sheet} fit={result.fit} />}
      </div>
      {result && (
        <WindowMapPanel
          sheet={sheet}
          aliquot={result.aliquot}
          onWindow={(windowNm) =>
            change('take a window of the map', (before) => setFit(before, { windowNm }))
          }
        />
      )}
      {result && hasUnexplainedBand(result) && withBand.length > 1 && (
        <MissingSpectrumPanel sheet={sheet} aliquots={withBand.length} />
      )}
    </>
  );
}

function hasUnexplainedBand({ doubts }: AliquotResult): boolean {
  return doubts.some(({ code }) => code === 'unexplained-band');
}

const noDoubts: readonly [] = [];
