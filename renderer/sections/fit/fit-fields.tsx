import { fitSettings, setFit } from '../../../analysis/index.ts';
import { Choice, Field } from '../../fields/field.tsx';
import { parseNonNegative, parsePositive, shown } from '../../fields/parse-entry.ts';
import type { SectionProps } from '../section.ts';
import { NoiseScans } from './noise-scans.tsx';
import { parseRanges, shownRanges } from './parse-ranges.ts';
import { StrayLightField } from './stray-light-field.tsx';

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

interface FitFieldsProps extends Pick<SectionProps, 'sheet' | 'change'> {
  /** The window in force; not known where there is no spectrum. */
  readonly low: number | undefined;
  readonly high: number | undefined;
}

/** The settings of the fit, typed. */
export function FitFields({ sheet, change, low, high }: FitFieldsProps) {
  const settings = fitSettings(sheet);
  const setWindow = (side: 0 | 1) => (text: string) => {
    const entry = parsePositive(text);
    if (!entry.ok) return entry.message;
    if (entry.value === undefined) {
      change('take the whole range', (before) => setFit(before, { windowNm: undefined }));
      return null;
    }
    const [from, to] = side === 0 ? [entry.value, high] : [low, entry.value];
    if (from === undefined || to === undefined) return 'Load a crude spectrum first.';
    if (!(from < to)) return 'The window would be empty.';
    change('set the window', (before) => setFit(before, { windowNm: [from, to] }));
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
          placeholder="none, or 300–304; 410–412"
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
        {settings.shift === 'common' && <ShiftPrior sheet={sheet} change={change} />}
      </dd>
      <dt>stray light</dt>
      <dd>
        <StrayLightField sheet={sheet} change={change} />
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

/** How well the wavelength scale is known: the less the offset is free, the sharper the answer. */
function ShiftPrior({ sheet, change }: Pick<SectionProps, 'sheet' | 'change'>) {
  return (
    <>
      {' '}
      scale known to{' '}
      <Field
        label="How well the wavelength scale is known, standard uncertainty, nm"
        title="Standard uncertainty with which crude and standards agree in wavelength before the fit; left empty, the offset is free, which widens the interval"
        placeholder="free"
        value={shown(sheet.fit?.shiftStandardUncertaintyNm)}
        commit={(text) => {
          const entry = parsePositive(text);
          if (!entry.ok) return entry.message;
          const { value } = entry;
          change('set how well the wavelength scale is known', (before) =>
            setFit(before, { shiftStandardUncertaintyNm: value }),
          );
          return null;
        }}
      />{' '}
      nm
    </>
  );
}

/** Both parts of the noise, or neither: half of a noise model is none. */
function NoiseFields({ sheet, change }: Pick<SectionProps, 'sheet' | 'change'>) {
  const noise = sheet.fit?.noise;
  const placeholder = (sheet.noiseScans ?? []).length > 0 ? 'from scans' : 'estimated';
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
          placeholder={placeholder}
          value={shown(noise?.constant, 1000)}
          commit={set('constant', 1000)}
        />{' '}
        constant,{' '}
        <Field
          label="Part of the noise from transmittance, mAU at absorbance 0"
          title="Grows as 10 to the absorbance"
          placeholder={placeholder}
          value={shown(noise?.transmittance, 1000)}
          commit={set('transmittance', 1000)}
        />{' '}
        from transmittance
      </dd>
      <dt>noise from scans</dt>
      <dd>
        <NoiseScans sheet={sheet} change={change} />
      </dd>
    </>
  );
}
