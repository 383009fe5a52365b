/** What would help most, from the largest share of the variance. */
export function adviceFor(source: string): string {
  if (source.startsWith('stock '))
    return `Weigh ${source} anew, or make a second stock of that species.`;
  if (source.startsWith('dilution of '))
    return 'Make more solutions of that species, or dilute with better glassware.';
  if (source.startsWith('scale of '))
    return 'Measure that standard again with a smaller uncertainty.';
  if (source.startsWith('scatter between'))
    return 'Find out which solution stands apart, and make it again.';
  if (source === 'noise of the standards')
    return 'Average more scans of the standards, or use stronger solutions.';
  if (source === 'lack of fit')
    return 'The model does not describe the spectrum: look at the residual and the doubts first.';
  if (source === 'baseline') return 'Record the blank with care and take a simpler baseline.';
  if (source === 'wavelength offset')
    return 'Check the wavelength scale, so that the offset need not be fitted.';
  if (source === 'standards of the same shape')
    return 'Widen the window to where the standards differ.';
  return 'Average more scans, or dilute less so that the weak species absorb more.';
}
