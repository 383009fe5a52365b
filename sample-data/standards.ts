import type { AbsorbingSpecies } from './bands.ts';

/** A weighed stock solution; the error of its weighing and flask is common to all made from it. */
export interface Stock {
  readonly id: string;
  readonly species: AbsorbingSpecies;
}

export interface StandardSolution {
  readonly id: string;
  readonly stock: Stock;
  /** As the label says; the true concentration is drawn. */
  readonly concentrationMolPerL: number;
}

const arm: Stock = { id: 'arm-A', species: 'arm' };
const monoA: Stock = { id: 'mono-A', species: 'mono' };
const monoB: Stock = { id: 'mono-B', species: 'mono' };
const bis: Stock = { id: 'bis-A', species: 'bis' };
const hydrolysis: Stock = { id: 'hydrolysis-A', species: 'hydrolysis' };

export const stocks: readonly Stock[] = [arm, monoA, monoB, bis, hydrolysis];

export const standardSolutions: readonly StandardSolution[] = [
  { id: 'arm-A1', stock: arm, concentrationMolPerL: 5.0e-5 },
  { id: 'arm-A2', stock: arm, concentrationMolPerL: 1.1e-4 },
  { id: 'mono-A1', stock: monoA, concentrationMolPerL: 2.0e-5 },
  { id: 'mono-A2', stock: monoA, concentrationMolPerL: 5.4e-5 },
  { id: 'mono-B1', stock: monoB, concentrationMolPerL: 3.6e-5 },
  { id: 'bis-A1', stock: bis, concentrationMolPerL: 1.1e-5 },
  { id: 'bis-A2', stock: bis, concentrationMolPerL: 2.0e-5 },
  { id: 'bis-A3', stock: bis, concentrationMolPerL: 3.0e-5 },
  { id: 'hydrolysis-A1', stock: hydrolysis, concentrationMolPerL: 4.0e-5 },
  { id: 'hydrolysis-A2', stock: hydrolysis, concentrationMolPerL: 1.0e-4 },
];
