import { keyValueCommas } from './layouts/key-value-commas.ts';
import { quotedHeadings } from './layouts/quoted-headings.ts';
import { semicolonsDecimalComma } from './layouts/semicolons-decimal-comma.ts';
import { spacedPercentTransmittance } from './layouts/spaced-percent-transmittance.ts';
import { tabsWithFooter } from './layouts/tabs-with-footer.ts';
import { inventedNote, overRange } from './parameters.ts';
import { type Trace, wavelengths } from './trace.ts';

/** One file of the sample: which traces it holds, in this order, and how they are recorded and written. */
export interface Export {
  /** Relative to the sheet. */
  readonly path: string;
  /** Ids of standards or aliquots. */
  readonly traces: readonly string[];
  readonly wavelengthNm: Float64Array;
  readonly write: (traces: readonly Trace[]) => Uint8Array;
}

type OneTraceLayout = (trace: Trace, note: string) => Uint8Array;

/** Standards begin at 238 nm, where the strongest of them stays below an absorbance of 2. */
const everyNm = wavelengths(238, 470, 1);
const everyHalfNm = wavelengths(238, 470, 0.5);
const everySecondNm = wavelengths(236, 472, 2);
const crudeNm = wavelengths(230, 470, 1);

export const sampleExports: readonly Export[] = [
  oneTrace('standards/arm-A1.dat', 'arm-A1', everyNm, spacedPercentTransmittance),
  oneTrace('standards/arm-A2.dat', 'arm-A2', everyNm, spacedPercentTransmittance),
  oneTrace('standards/mono-A1.csv', 'mono-A1', everyNm, keyValueCommas),
  oneTrace('standards/mono-A2.csv', 'mono-A2', everyNm, keyValueCommas),
  oneTrace('standards/mono-B1.csv', 'mono-B1', everyNm, keyValueCommas),
  {
    path: 'standards/bis.csv',
    traces: ['bis-A1', 'bis-A2', 'bis-A3'],
    wavelengthNm: everyHalfNm,
    write: (traces) => semicolonsDecimalComma(traces, inventedNote, overRange),
  },
  {
    path: 'standards/hydrolysis.csv',
    traces: ['hydrolysis-A1', 'hydrolysis-A2'],
    wavelengthNm: everySecondNm,
    write: (traces) => quotedHeadings(traces, inventedNote),
  },
  {
    path: 'crude/arm-into-core.csv',
    traces: ['r1-a1', 'r1-a2', 'r1-a3'],
    wavelengthNm: crudeNm,
    write: (traces) => semicolonsDecimalComma(traces, inventedNote, overRange),
  },
  {
    path: 'crude/core-into-arm.txt',
    traces: ['r2-a1', 'r2-a2', 'r2-a3'],
    wavelengthNm: crudeNm,
    write: (traces) => tabsWithFooter(traces, inventedNote),
  },
];

/** Where a standard or an aliquot is to be found. */
export function placeOf(id: string): { readonly file: string; readonly trace: number } {
  const found = sampleExports.find(({ traces }) => traces.includes(id));
  if (found === undefined) throw new RangeError(`no export holds ${id}`);
  return { file: found.path, trace: found.traces.indexOf(id) };
}

function oneTrace(
  path: string,
  id: string,
  wavelengthNm: Float64Array,
  layout: OneTraceLayout,
): Export {
  return {
    path,
    traces: [id],
    wavelengthNm,
    write: (traces) => {
      const trace = traces[0];
      if (trace === undefined) throw new RangeError(`${path} needs a trace`);
      return layout(trace, inventedNote);
    },
  };
}
