/** Wavelengths and amounts as the messages of doubts write them. */

/** Runs of neighbouring points that satisfy `holds`, as [low, high] in nm laid end to end. */
export function rangesWhere(
  wavelengthNm: Float64Array,
  holds: (point: number) => boolean,
): number[] {
  const ranges: number[] = [];
  let inside = false;
  for (const [i, nm] of wavelengthNm.entries()) {
    const here = holds(i);
    if (here && !inside) ranges.push(nm, nm);
    else if (here) ranges[ranges.length - 1] = nm;
    inside = here;
  }
  return ranges;
}

/** "236 to 247 nm and 301 nm". */
export function rangesText(ranges: readonly number[]): string {
  const texts: string[] = [];
  for (let i = 0; i + 1 < ranges.length; i += 2) {
    const [low, high] = [nmText(ranges[i]!), nmText(ranges[i + 1]!)];
    texts.push(low === high ? low : `${low} to ${high}`);
  }
  return `${listText(texts)} nm`;
}

/** "a, b and c". */
export function listText(entries: readonly string[]): string {
  if (entries.length < 2) return entries.join('');
  return `${entries.slice(0, -1).join(', ')} and ${entries.at(-1)}`;
}

export function nmText(nm: number): string {
  return String(Number(nm.toFixed(2)));
}

/** A cuvette amount, mol/L in, two figures and a unit out. */
export function amountText(molPerL: number): string {
  const micro = molPerL * 1e6;
  if (micro >= 1000) return `${twoFigures(micro / 1000)} mmol/L`;
  if (micro >= 0.01 || micro === 0) return `${twoFigures(micro)} µmol/L`;
  return `${twoFigures(micro * 1000)} nmol/L`;
}

/** Two significant figures, never as an exponent. */
export function twoFigures(value: number): string {
  if (value === 0 || !Number.isFinite(value)) return value === 0 ? '0' : 'without bound';
  const decimals = 1 - Math.floor(Math.log10(Math.abs(value)));
  return decimals >= 0
    ? value.toFixed(Math.min(decimals, 12))
    : String(Math.round(value / 10 ** -decimals) * 10 ** -decimals);
}

export function percentText(fraction: number): string {
  return `${twoFigures(100 * fraction)} %`;
}
