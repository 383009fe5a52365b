import {
  type AliquotResult,
  figuresText,
  fitSettings,
  numberText,
  setFit,
} from '../../../analysis/index.ts';
import { Choice, Field } from '../../fields/field.tsx';
import { parseNonNegative, parsePositive, shown } from '../../fields/parse-entry.ts';
import { FitPlot } from '../../plots/fit-plot.tsx';
import type { SectionProps } from '../section.ts';
import { parseRanges, shownRanges } from './parse-ranges.ts';

export function fitSummary({ quantification, aliquot }: SectionProps): string {
  const result = quantification?.results.aliquots.find((each) => each.aliquot === aliquot);
  if (!result) return 'nothing fitted yet';
  const { fit } = result;
  return `${result.aliquot}: ${fit.points} points, ${fit.windowNm[0]} to ${fit.windowNm[1]} nm, residual ${figuresText(1000 * fit.residualRms)} mAU`;
}

export function FitSection(props: SectionProps) {
  const { sheet, quantification, obstacle, aliquot, change } = props;
  const aliquots = sheet.aliquots ?? [];
  if (aliquots.length === 0)
    return <p class="empty">The fit appears here once there is a crude spectrum.</p>;
  const result = quantification?.results.aliquots.find((each) => each.aliquot === aliquot);
  const curves = quantification?.curves.find((each) => each.aliquot === aliquot);
  const refused = quantification?.results.refused.find(({ what }) => what === `aliquot ${aliquot}`);
  return (
    <>
      <AliquotPicker {...props} />
      {obstacle !== null && <p class="obstacle">{obstacle}</p>}
      {refused && <p class="obstacle">{refused.why}</p>}
      {result && curves && (
        <FitPlot
          sheet={sheet}
          curves={curves}
          doubts={result.doubts}
          windowNm={fitSettings(sheet).windowNm ?? result.fit.windowNm}
          onWindow={([low, high], gesture) =>
            change(
              'move the window',
              (before) => setFit(before, { windowNm: [low, high] }),
              gesture,
            )
          }
        />
      )}
      <div class="fit-lower">
        <FitFields {...props} />
        {result && <FitFigures result={result} />}
      </div>
    </>
  );
}

function AliquotPicker({ sheet, aliquot, chooseAliquot }: SectionProps) {
  const aliquots = sheet.aliquots ?? [];
  const at = aliquots.findIndex(({ id }) => id === aliquot);
  const step = (by: number): void => {
    const next = aliquots[at + by];
    if (next) chooseAliquot(next.id);
  };
  return (
    <div class="picker">
      <button
        type="button"
        class="quiet"
        disabled={at <= 0}
        aria-label="Previous aliquot"
        onClick={() => step(-1)}
      >
        ←
      </button>
      <Choice
        label="Aliquot shown"
        value={aliquot ?? ''}
        options={aliquots.map(({ id, run }) => ({
          value: id,
          text: run === undefined ? id : `${id}, run ${run}`,
        }))}
        choose={chooseAliquot}
      />
      <button
        type="button"
        class="quiet"
        disabled={at >= aliquots.length - 1}
        aria-label="Next aliquot"
        onClick={() => step(1)}
      >
        →
      </button>
    </div>
  );
}

const baselines = [
  { value: 'offset', text: 'offset: one constant' },
  { value: 'line', text: 'line: offset and slope' },
  { value: 'scatter', text: 'scatter: offset and λ⁻⁴ (turbid)' },
  { value: 'none', text: 'none' },
] as const;
const shifts = [
  { value: 'none', text: 'none' },
  { value: 'common', text: 'found by the fit' },
] as const;

function FitFields({ sheet, quantification, aliquot, change }: SectionProps) {
  const settings = fitSettings(sheet);
  const result = quantification?.results.aliquots.find((each) => each.aliquot === aliquot);
  const [low, high] = settings.windowNm ?? result?.fit.windowNm ?? [undefined, undefined];
  const setWindow = (side: 0 | 1) => (text: string) => {
    const entry = parsePositive(text);
    if (!entry.ok) return entry.message;
    if (entry.value === undefined) {
      change('take the whole range', (before) => setFit(before, { windowNm: undefined }));
      return null;
    }
    const next: [number, number] =
      side === 0 ? [entry.value, high ?? 1e4] : [low ?? 1, entry.value];
    if (!(next[0] < next[1])) return 'The window would be empty.';
    change('set the window', (before) => setFit(before, { windowNm: next }));
    return null;
  };
  return (
    <dl class="settings">
      <dt>window, nm</dt>
      <dd>
        <Field label="Window from, nm" value={shown(low)} commit={setWindow(0)} /> to{' '}
        <Field label="Window to, nm" value={shown(high)} commit={setWindow(1)} />
      </dd>
      <dt>left out, nm</dt>
      <dd>
        <Field
          label="Ranges left out, nm"
          value={shownRanges(sheet.fit?.excludeNm)}
          placeholder="none; 300–304; 410–412"
          commit={(text) => {
            const entry = parseRanges(text);
            if (!entry.ok) return entry.message;
            const ranges = entry.value.map(([from, to]) => [from, to] as const);
            change('leave out ranges', (before) =>
              setFit(before, { excludeNm: ranges.length > 0 ? ranges : undefined }),
            );
            return null;
          }}
        />
      </dd>
      <dt>baseline</dt>
      <dd>
        <Choice
          label="Baseline"
          value={settings.baseline}
          options={baselines}
          choose={(value) => {
            const baseline = baselines.find((each) => each.value === value)?.value;
            change('set the baseline', (before) => setFit(before, { baseline }));
          }}
        />
      </dd>
      <dt>wavelength offset</dt>
      <dd>
        <Choice
          label="Wavelength offset"
          value={settings.shift}
          options={shifts}
          choose={(value) => {
            const shift = shifts.find((each) => each.value === value)?.value;
            change('set the wavelength offset', (before) => setFit(before, { shift }));
          }}
        />
      </dd>
      <dt>upper absorbance</dt>
      <dd>
        <Field
          label="Upper absorbance"
          value={shown(settings.upperAbsorbance)}
          commit={(text) => {
            const entry = parsePositive(text);
            if (!entry.ok) return entry.message;
            const { value } = entry;
            change('set the upper absorbance', (before) =>
              setFit(before, { upperAbsorbance: value }),
            );
            return null;
          }}
        />
      </dd>
      <NoiseFields sheet={sheet} change={change} />
    </dl>
  );
}

/** Both parts of the noise, or neither: half of a noise model is none. */
function NoiseFields({ sheet, change }: Pick<SectionProps, 'sheet' | 'change'>) {
  const noise = sheet.fit?.noise;
  const set = (part: 'constant' | 'transmittance', factor: number) => (text: string) => {
    const entry = parseNonNegative(text);
    if (!entry.ok) return entry.message;
    const { value } = entry;
    if (value === undefined) {
      change('let the noise be estimated', (before) => setFit(before, { noise: undefined }));
      return null;
    }
    const other = { constant: noise?.constant ?? 0, transmittance: noise?.transmittance ?? 0 };
    const next = { ...other, [part]: Number((value / factor).toPrecision(12)) };
    if (next.constant === 0 && next.transmittance === 0)
      return 'One of the two must be more than 0.';
    change('set the noise', (before) => setFit(before, { noise: next }));
    return null;
  };
  return (
    <>
      <dt>noise, mAU</dt>
      <dd>
        <Field
          label="Constant part of the noise, mAU"
          title="Standard deviation of one reading, the same at every absorbance"
          placeholder="estimated"
          value={shown(noise?.constant, 1000)}
          commit={set('constant', 1000)}
        />{' '}
        constant,{' '}
        <Field
          label="Part of the noise from transmittance, mAU at absorbance 0"
          title="Grows as 10 to the absorbance"
          placeholder="estimated"
          value={shown(noise?.transmittance, 1000)}
          commit={set('transmittance', 1000)}
        />{' '}
        from transmittance
      </dd>
    </>
  );
}

function FitFigures({ result }: { readonly result: AliquotResult }) {
  const { fit } = result;
  const { noise, shiftNm, baseline } = fit;
  const milli = (absorbance: number): string => figuresText(1000 * absorbance);
  return (
    <dl class="figures">
      <dt>points</dt>
      <dd>{fit.points}</dd>
      <dt>residual, rms</dt>
      <dd>{milli(fit.residualRms)} mAU</dd>
      <dt>reduced χ²</dt>
      <dd>{fit.reducedChiSquare === null ? 'not known' : numberText(fit.reducedChiSquare, 2)}</dd>
      <dt>noise {noise.from === 'sheet' ? 'given' : 'estimated'}</dt>
      <dd>
        {milli(noise.constant)} and {milli(noise.transmittance)} mAU
      </dd>
      {shiftNm.standardUncertainty !== 0 && (
        <>
          <dt>wavelength offset</dt>
          <dd>
            {numberText(shiftNm.value ?? 0, 3)} nm (u{' '}
            {numberText(shiftNm.standardUncertainty ?? 0, 3)})
          </dd>
        </>
      )}
      {baseline.map(({ term, absorbance }) => (
        <BaselineFigure
          key={term}
          term={term}
          value={absorbance.value}
          u={absorbance.standardUncertainty}
        />
      ))}
    </dl>
  );
}

function BaselineFigure({
  term,
  value,
  u,
}: {
  term: string;
  value: number | null;
  u: number | null;
}) {
  return (
    <>
      <dt>baseline {term}</dt>
      <dd>
        {numberText(1000 * (value ?? 0), 2)} mAU (u {numberText(1000 * (u ?? 0), 2)})
      </dd>
    </>
  );
}
