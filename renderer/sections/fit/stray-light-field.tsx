import { useState } from 'preact/hooks';
import { fitSettings, setFit } from '../../../analysis/index.ts';
import { Choice, Field } from '../../fields/field.tsx';
import { shown } from '../../fields/parse-entry.ts';
import type { SectionProps } from '../section.ts';
import { parseStrayLight } from './parse-stray-light.ts';

const ways = [
  { value: 'none', text: 'none' },
  { value: 'stated', text: 'stated' },
  { value: 'fit', text: 'found by the fit' },
] as const;

/** Stray light: none, so much of the light, or to be found. */
export function StrayLightField({ sheet, change }: Pick<SectionProps, 'sheet' | 'change'>) {
  const { strayLight } = fitSettings(sheet);
  // stated, and how much is still to be typed: nothing for the sheet yet
  const [isToBeTyped, setToBeTyped] = useState(false);
  const stated = typeof strayLight === 'number' && strayLight > 0 ? strayLight : undefined;
  const way =
    stated !== undefined || isToBeTyped ? 'stated' : strayLight === 'fit' ? 'fit' : 'none';
  const choose = (value: string): void => {
    setToBeTyped(value === 'stated');
    if (value === 'fit') {
      change('find the stray light by the fit', (before) => setFit(before, { strayLight: 'fit' }));
    } else if (strayLight !== 0) {
      change('take no stray light', (before) => setFit(before, { strayLight: undefined }));
    }
  };
  return (
    <>
      <Choice label="Stray light" value={way} options={ways} choose={choose} />
      {way === 'stated' && (
        <>
          {' '}
          <Field
            label="Stray light, % of the light"
            title="Share of the light that reaches the detector past the sample, at every wavelength"
            value={shown(stated, 100)}
            placeholder="0.05"
            isNeeded
            commit={(text) => {
              const entry = parseStrayLight(text);
              if (!entry.ok) return entry.message;
              const fraction = entry.value === 0 ? undefined : entry.value;
              setToBeTyped(fraction === undefined);
              change('state the stray light', (before) => setFit(before, { strayLight: fraction }));
              return null;
            }}
          />{' '}
          %
        </>
      )}
    </>
  );
}
