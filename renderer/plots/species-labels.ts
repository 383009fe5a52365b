import { useMemo } from 'preact/hooks';
import { type Sheet, speciesLabel } from '../../analysis/index.ts';

/** Short names by id; the same map as long as the names are. */
export function useLabels(sheet: Sheet): ReadonlyMap<string, string> {
  const pairs = sheet.species.map(({ id }) => [id, speciesLabel(sheet, id)] as const);
  const key = JSON.stringify(pairs);
  // the key says all there is to say of the pairs
  return useMemo(() => new Map(pairs), [key]);
}
