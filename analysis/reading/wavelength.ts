import type { AxisUnit } from './column-words.ts';

export const LOWEST_NM = 100;
export const HIGHEST_NM = 4000;

/** Wavelengths of photometers, from the vacuum ultraviolet to the near infrared. */
export const isPlausibleNm = (value: number) => value >= LOWEST_NM && value <= HIGHEST_NM;

/** Planck's constant times the speed of light, eV nm; both exact since the SI of 2019. */
const HC_EV_NM = 1239.841_984_332_002;

/** A decimal shift that keeps the printed digits, which a multiplication would round. */
const shifted = (value: number, powerOfTen: number) => {
  const [mantissa = '', exponent = '0'] = String(value).split('e');
  return Number(`${mantissa}e${Number(exponent) + powerOfTen}`);
};

/** Wavelength in nm from an abscissa in the file's unit; as given, without correction for air. */
export function toNm(value: number, unit: AxisUnit): number {
  switch (unit) {
    case 'nm':
      return value;
    case 'µm':
      return shifted(value, 3);
    case 'Å':
      return shifted(value, -1);
    case 'cm-1':
      return 1e7 / value;
    case 'eV':
      return HC_EV_NM / value;
  }
}
