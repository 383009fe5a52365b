import {
  numberText,
  type Sheet,
  type StandardCurves,
  speciesLabel,
} from '../../../analysis/index.ts';

/** Up to which absorbance the standards of each species were seen to follow Beer-Lambert, in a sentence. */
export function linearityText(sheet: Sheet, standards: readonly StandardCurves[]): string {
  const parts = standards.map(({ species, linearity }) => {
    const name = speciesLabel(sheet, species);
    if (!linearity) return `${name}: the solutions are too alike to tell`;
    const { testedUpTo, straightUpTo } = linearity;
    if (straightUpTo >= testedUpTo) return `${name}: no bend up to ${numberText(testedUpTo, 2)}`;
    return straightUpTo > 0
      ? `${name}: bends above ${numberText(straightUpTo, 2)}`
      : `${name}: bends from the start`;
  });
  return `Absorbance against concentration. ${parts.join('; ')}.`;
}
