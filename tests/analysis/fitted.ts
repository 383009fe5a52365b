import { type AliquotResult, type Quantified, quantify, type Sheet } from '../../analysis/index.ts';

/** Every spectrum of a synthetic sheet is embedded. */
export const noFiles = new Map();

export function first(sheet: Sheet): AliquotResult {
  const result = quantify(sheet, noFiles).results.aliquots[0];
  if (!result) throw new Error('nothing was fitted');
  return result;
}

export function amountOf(result: AliquotResult, species: string): Quantified {
  const found = result.concentrations.find((each) => each.species === species);
  if (!found) throw new Error(`no ${species}`);
  return found.cuvetteMolPerL;
}

export function holds({ interval95: [low, high] }: Quantified, truth: number): boolean {
  return (low ?? Number.NEGATIVE_INFINITY) <= truth && truth <= (high ?? Number.POSITIVE_INFINITY);
}

export function codesOf(result: AliquotResult): string[] {
  return result.doubts.map(({ code }) => code);
}
