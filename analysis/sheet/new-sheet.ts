import type { Sheet } from './schema.ts';

/** An empty sheet: a core with two sites, an arm, and the two products, ready to be named. */
export function newSheet(): Sheet {
  return {
    format: 'monobis-sheet',
    version: 1,
    title: '',
    reaction: { core: 'core', arm: 'arm', sites: 2 },
    species: [
      { id: 'core', name: 'core', cores: 1, arms: 0, absorbs: false },
      { id: 'arm', name: 'arm', cores: 0, arms: 1 },
      { id: 'mono', name: 'mono', cores: 1, arms: 1 },
      { id: 'bis', name: 'bis', cores: 1, arms: 2 },
    ],
    stocks: [],
    standards: [],
    runs: [],
    aliquots: [],
    fit: { baseline: 'offset', shift: 'none', upperAbsorbance: 2 },
  };
}
