import type { Sheet } from '../analysis/index.ts';
import { placeOf } from './exports.ts';
import {
  aliquotDilutionRelativeUncertainty,
  fitWindowNm,
  standardDilutionRelativeUncertainty,
  stockRelativeUncertainty,
} from './parameters.ts';
import { aliquotsPerRun, sampleRuns } from './runs.ts';
import { standardSolutions, stocks } from './standards.ts';

/** The sheet that a chemist would have filled in: labels and charges, none of the true values. */
export function workingSheet(): Sheet {
  return {
    format: 'monobis-sheet',
    version: 1,
    title: 'Invented sample: two orders of addition in a double substitution of piperazine',
    invented: true,
    reaction: { core: 'piperazine', arm: 'arm', sites: 2 },
    species,
    stocks: stocks.map((stock) => ({
      ...stock,
      relativeStandardUncertainty: stockRelativeUncertainty,
    })),
    standards: standardSolutions.map(({ id, stock, concentrationMolPerL }) => ({
      id,
      species: stock.species,
      stock: stock.id,
      spectrum: placeOf(id),
      concentrationMolPerL,
      relativeStandardUncertainty: standardDilutionRelativeUncertainty,
      pathLengthCm: 1,
    })),
    runs: sampleRuns.map(({ id, name, order, coreMol, armMol, volumeL, additionTimeMin }) => ({
      id,
      name,
      order,
      chargedMol: { piperazine: coreMol, arm: armMol },
      volumeL,
      additionTimeMin,
    })),
    aliquots: sampleRuns.flatMap((run) =>
      Array.from({ length: aliquotsPerRun }, (_, i) => ({
        id: `${run.id}-a${i + 1}`,
        run: run.id,
        spectrum: placeOf(`${run.id}-a${i + 1}`),
        pathLengthCm: 1,
        dilution: {
          factor: run.dilutionFactor,
          relativeStandardUncertainty: aliquotDilutionRelativeUncertainty,
        },
      })),
    ),
    fit: { windowNm: [fitWindowNm[0], fitWindowNm[1]], baseline: 'offset' },
  };
}

const species: Sheet['species'] = [
  {
    id: 'piperazine',
    name: 'piperazine',
    cores: 1,
    arms: 0,
    absorbs: false,
    molarMassGPerMol: 86.14,
  },
  {
    id: 'arm',
    name: '2-chloro-5-nitropyridine',
    cores: 0,
    arms: 1,
    absorbs: true,
    molarMassGPerMol: 158.54,
  },
  {
    id: 'mono',
    name: '1-(5-nitropyridin-2-yl)piperazine',
    cores: 1,
    arms: 1,
    absorbs: true,
    molarMassGPerMol: 208.22,
  },
  {
    id: 'bis',
    name: '1,4-bis(5-nitropyridin-2-yl)piperazine',
    cores: 1,
    arms: 2,
    absorbs: true,
    molarMassGPerMol: 330.3,
  },
  {
    id: 'hydrolysis',
    name: '5-nitropyridin-2-ol',
    cores: 0,
    arms: 0,
    absorbs: true,
    molarMassGPerMol: 140.1,
  },
];
