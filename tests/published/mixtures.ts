import * as v from 'valibot';
import { factorise } from '../../analysis/unmixing/orthogonal.ts';
import { published } from './values.ts';

const standardSchema = v.object({
  molPerL: v.optional(v.number()),
  ppm: v.optional(v.number()),
  absorbance: v.array(v.number()),
});
export const workupSchema = v.object({
  sampleG: v.number(),
  dissolvedMl: v.number(),
  aliquotMl: v.optional(v.number()),
  madeUpMl: v.optional(v.number()),
  molarMass: v.record(v.string(), v.number()),
});
const exampleSchema = v.object({
  id: v.string(),
  status: v.string(),
  source: v.string(),
  species: v.array(v.string()),
  pathLengthCm: v.number(),
  absorptivity: v.array(v.array(v.number())),
  standards: v.optional(v.array(standardSchema)),
  absorbance: v.array(v.number()),
  blank: v.optional(v.array(v.number())),
  publishedAnswer: v.optional(v.record(v.string(), v.number())),
  publishedMassPercent: v.optional(v.record(v.string(), v.number())),
  workup: v.optional(workupSchema),
  massFractions: v.optional(v.object({ Co: v.number(), Ni: v.number() })),
  massPercentComputed: v.optional(v.record(v.string(), v.number())),
  computed: v.object({
    x: v.array(v.number()),
    sd: v.optional(v.array(v.number())),
    residualSd: v.optional(v.number()),
    correlation: v.optional(v.number()),
  }),
});
export type Example = v.InferOutput<typeof exampleSchema>;

const leastSquaresSchema = v.object({
  x: v.array(v.number()),
  sd: v.array(v.number()),
  residualSd: v.number(),
  correlation: v.number(),
});
const fileSchema = v.object({
  examples: v.array(exampleSchema),
  chlorophyll: v.array(
    v.object({
      id: v.string(),
      millimolarAbsorptivity: v.optional(
        v.object({ a: v.array(v.number()), b: v.array(v.number()) }),
      ),
      inverseComputed: v.optional(v.object({ a: v.array(v.number()), b: v.array(v.number()) })),
    }),
  ),
  haemoglobin: v.object({
    rows: v.array(v.tuple([v.number(), v.number(), v.number()])),
    check: v.object({
      absorbance: v.array(v.number()),
      leastSquares: leastSquaresSchema,
      conditionColumnScaled: v.number(),
    }),
  }),
});
export const file = v.parse(fileSchema, published('worked-mixtures.json'));
/** A few roundings of doubles, the condition of these pairs (up to 3) times some 1e-16. */
export const tight = 1e-14;

export function relative(value: number | undefined, right: number | undefined): number {
  return Math.abs((value ?? Number.NaN) / (right ?? Number.NaN) - 1);
}

interface Spread {
  readonly residualSd: number;
  readonly sd: readonly number[];
  readonly correlation: number;
}

/** Standard deviations and correlation of the first two amounts, equal weights. */
export function spreadOf(
  columns: readonly Float64Array[],
  signal: Float64Array,
  answer: Float64Array,
): Spread {
  const residual = signal.map((value, i) =>
    columns.reduce((left, column, k) => left - (column[i] ?? 0) * (answer[k] ?? 0), value),
  );
  const residualSd = Math.hypot(...residual) / Math.sqrt(signal.length - columns.length);
  const rows = factorise(columns).pseudoInverse();
  const lengths = rows.map((row) => Math.hypot(...row));
  const [first = new Float64Array(0), second = new Float64Array(0)] = rows;
  const along = first.reduce((sum, value, i) => sum + value * (second[i] ?? 0), 0);
  return {
    residualSd,
    sd: lengths.map((length) => length * residualSd),
    correlation: along / ((lengths[0] ?? 0) * (lengths[1] ?? 0)),
  };
}
