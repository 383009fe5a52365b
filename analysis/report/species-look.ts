import { absorbingSpecies } from '../sheet/defaults.ts';
import type { Sheet } from '../sheet/schema.ts';

/** How a species is drawn, on screen and in print: a colour for light and for dark, and a line pattern. */
export interface SpeciesLook {
  /** On white; contrast at least 4.5 : 1. */
  readonly colour: string;
  /** On #191e21; contrast at least 4.5 : 1. */
  readonly darkColour: string;
  /** SVG stroke-dasharray; "" is a solid line. */
  readonly dash: string;
}

/** Told apart by lightness and pattern as well as by hue, so that they survive colour blindness and grey print. */
const looks: readonly [SpeciesLook, ...SpeciesLook[]] = [
  { colour: '#1c669f', darkColour: '#74b6f0', dash: '' },
  { colour: '#a84a0a', darkColour: '#f2a766', dash: '8 3' },
  { colour: '#08694a', darkColour: '#5ad3a6', dash: '2 2.5' },
  { colour: '#7d3a9c', darkColour: '#d6a2ea', dash: '9 3 2 3' },
  { colour: '#6b5d00', darkColour: '#d9c953', dash: '14 4' },
  { colour: '#a3274f', darkColour: '#f497b6', dash: '4 2' },
  { colour: '#3d4c5f', darkColour: '#b3c0cf', dash: '6 2 1.5 2 1.5 2' },
  { colour: '#5a3a20', darkColour: '#d3a983', dash: '1.5 4' },
];

/** How many looks there are; after that they come round again. */
export const lookCount = looks.length;

/** @param index position of the species among the absorbing species of the sheet */
export function speciesLook(index: number): SpeciesLook {
  return looks[((index % lookCount) + lookCount) % lookCount] ?? looks[0];
}

/** Position of a species among the absorbing ones; null where it does not absorb or is not there. */
export function lookIndex(sheet: Sheet, species: string): number | null {
  const index = absorbingSpecies(sheet).findIndex(({ id }) => id === species);
  return index === -1 ? null : index;
}

/** The look of a species by id; of the first one where the sheet does not know it. */
export function lookOf(sheet: Sheet, species: string): SpeciesLook {
  return speciesLook(lookIndex(sheet, species) ?? 0);
}
