import { plainHeading } from './column-words.ts';
import type { Quantity } from './reading.ts';

export type QuantityWord =
  | { readonly kind: 'quantity'; readonly quantity: Quantity; readonly unit: 'given' | 'left-open' }
  /** A quantity that cannot be read as one of ours; `why` completes "which …". */
  | { readonly kind: 'foreign'; readonly why: string };

const named = (quantity: Quantity, unit: 'given' | 'left-open' = 'given'): QuantityWord => ({
  kind: 'quantity',
  quantity,
  unit,
});

const foreign = (why: string): QuantityWord => ({ kind: 'foreign', why });

interface Heading {
  /** As it stands in the file, without what is in brackets or after a slash. */
  readonly core: string;
  readonly plain: string;
  readonly words: readonly string[];
  /** `plain` without blanks, dots and signs of multiplication, to compare units. */
  readonly compact: string;
}

/**
 * The quantity that a heading names, in the trade's words of several languages; null where it names
 * none (a sample's name, say). "A" and "T" count only alone: "Sample A" names no quantity.
 */
export function quantityNamed(text: string): QuantityWord | null {
  const heading = takeApart(text.slice(0, 300));
  if (heading.plain === '') return null;
  const isLog = /(?<!\p{L})(?:log|lg|ln)(?:10)?\s?[(\s[]?\s?(?:ε|epsilon|a(?!\p{L})|abs)/u.test(
    heading.plain,
  );
  if (isLog) return foreign('is a logarithm');
  return foreignWord(heading) ?? ours(heading);
}

function ours(heading: Heading): QuantityWord | null {
  const molar = molarAbsorptivity(heading);
  if (molar) return molar;
  const transmittance = transmittanceWord(heading);
  const absorbance = absorbanceWord(heading);
  if (transmittance && absorbance) return foreign('names absorbance and transmittance at once');
  return transmittance ?? absorbance;
}

function takeApart(text: string): Heading {
  const plain = plainHeading(text);
  return {
    core: text
      .normalize('NFKC')
      .replace(/[([{][^)\]}]*[)\]}]?/g, ' ')
      .replace(/\/.*$/, '')
      .trim(),
    plain,
    words: plain.split(/[^\p{L}\p{N}%]+/u).filter(Boolean),
    compact: plain.replace(/[\s·.*×^_⋅]/g, ''),
  };
}

const foreignStems: readonly (readonly [string, string])[] = [
  ['reflect', 'is a reflectance'],
  ['reflekt', 'is a reflectance'],
  ['remission', 'is a reflectance'],
  ['reflexion', 'is a reflectance'],
  ['derivative', 'is a derivative'],
  ['derivativ', 'is a derivative'],
  ['ableitung', 'is a derivative'],
  ['absorptance', 'is an absorptance (the part of the light that is absorbed)'],
  ['fluoresc', 'is a fluorescence'],
  ['fluoresz', 'is a fluorescence'],
  ['milliabs', 'is in thousandths of an absorbance unit'],
  ['mabs', 'is in thousandths of an absorbance unit'],
];

const foreignAlone = new Map([
  ['intensity', 'is an intensity'],
  ['intensität', 'is an intensity'],
  ['counts', 'is a count'],
  ['energy', 'is an energy'],
  ['energie', 'is an energy'],
  ['emission', 'is an emission'],
  ['single beam', 'is a single-beam signal'],
  ['sd', 'is a standard deviation'],
  ['std', 'is a standard deviation'],
  ['stdev', 'is a standard deviation'],
  ['rsd', 'is a standard deviation'],
  ['error', 'is an error'],
  ['fehler', 'is an error'],
  ['σ', 'is a standard deviation'],
  ['%r', 'is a reflectance'],
  ['r%', 'is a reflectance'],
  ['% r', 'is a reflectance'],
  ['%a', 'is an absorptance (the part of the light that is absorbed)'],
  ['t', 'may be a time, a temperature or a transmittance'],
]);

function foreignWord({ core, plain, words, compact }: Heading): QuantityWord | null {
  if (words.includes('mau') || words.includes('mod')) {
    return foreign('is in thousandths of an absorbance unit');
  }
  const stem = foreignStems.find(([start]) => words.some((word) => word.startsWith(start)));
  if (stem) return foreign(stem[1]);
  if (/(?<!\p{L})d\^?[2-4]?a\s?\/\s?d/u.test(plain)) return foreign('is a derivative');
  if (
    /^(?:standard deviation|std\.? dev|standardabweichung|uncertainty|unsicherheit)/.test(plain)
  ) {
    return foreign('is an uncertainty');
  }
  const isCapitalT = core === 'T';
  const why = isCapitalT ? undefined : foreignAlone.get(core.toLowerCase());
  // "t (%)" can only be a transmittance.
  if (why && !(core === 't' && compact.includes('%'))) return foreign(why);
  return null;
}

/** L mol⁻¹ cm⁻¹ in its usual spellings; `.` stands for any sign of multiplication or blank. */
const goodMolarUnit = new RegExp(
  [
    '(?:l|dm3).mol-1.cm-1',
    '(?:l|dm3).cm-1.mol-1',
    'm-1.cm-1',
    'cm-1.m-1',
    '(?:l|dm3).[/].[(]?mol.[/]?.cm[)]?',
    '1.[/].[(]m.cm[)]',
  ]
    .map((spelling) =>
      spelling
        .replaceAll('.', '[\\s·*×⋅.]{0,3}')
        .replaceAll('-1', '\\^?-1')
        .replace('dm3', 'dm\\^?3'),
    )
    .map((pattern) => `(?<![\\p{L}\\p{N}])(?:${pattern})(?![\\p{L}\\p{N}])`)
    .join('|'),
  'u',
);
const otherMolarUnit =
  /(?:mm|μm|m)-1cm-1|cm-1(?:mm|μm)-1|[cm]?m2(?:mmol|mol|\/mmol|\/mol)|mmol|μmol|kmol|103|104|105|1000|[x/]10|k(?:l|m-1)/;

function molarAbsorptivity({ plain, words, compact }: Heading): QuantityWord | null {
  const isCoefficient =
    /(?:extinction|absorption|attenuation) coefficient|(?:extinktions|absorptions)koeffizient|coefficient d'extinction|coeficiente de (?:extinción|absorción|extinção|absorção)|coefficiente di (?:estinzione|assorbimento)|absorptivity|吸光系数|吸光係数/.test(
      plain,
    );
  const isSymbol = words.some((word) => word === 'ε' || word === 'epsilon' || word === 'eps');
  const hasUnit = goodMolarUnit.test(plain);
  if (!isCoefficient && !isSymbol && !hasUnit) return null;
  if (/spe[cz]ifi/.test(plain)) return foreign('is a specific, not a molar absorptivity');
  const isScaled = /10\^|10[345](?!\d)|1000|(?:×|x|\*|\/)\s?10/.test(plain);
  if (isScaled) return foreign('is scaled by a power of ten');
  if (hasUnit) return named('molar-absorptivity');
  if (otherMolarUnit.test(compact)) return foreign('is in another unit than L mol⁻¹ cm⁻¹');
  const isMolar =
    isSymbol || words.some((word) => word.startsWith('molar') || word.startsWith('molair'));
  const hasOtherUnit = /cm-1|m-1|1\/cm|1\/m/.test(compact);
  if (hasOtherUnit) return foreign('is in another unit than L mol⁻¹ cm⁻¹');
  return isMolar || isCoefficient ? named('molar-absorptivity', 'left-open') : null;
}

const transmittanceStems = [
  'transmitt',
  'transmiss',
  'transmitan',
  'trasmitt',
  'trasmiss',
  'durchlässig',
  'durchlaessig',
  '透過',
  '透过',
  '透光',
];

function transmittanceWord({ core, plain, words, compact }: Heading): QuantityWord | null {
  const isPercent = /%|(?<!\p{L})(?:percent|prozent|pct|pourcent|por ciento)/u.test(plain);
  const isNamed = words.some((word) =>
    transmittanceStems.some((stem) => word.startsWith(stem) || word.startsWith(`%${stem}`)),
  );
  const isCompound = words.some((word) => word.endsWith('transmissionsgrad'));
  const isSymbol =
    core === 'T' ||
    /(?<![\p{L}\p{N}])(?:%\s?t|t\s?%|t\s?[([/]\s?%|%\s?[([]\s?t)(?![\p{L}\p{N}])/u.test(plain);
  const isWhole = isSymbol || compact === 't%' || compact === '%t';
  if (!isNamed && !isCompound && !isWhole) return null;
  return named(isPercent ? 'percent-transmittance' : 'transmittance');
}

const absorbanceWords = new Set([
  'absorbance',
  'absorbances',
  'absorbanz',
  'abs',
  'absorption',
  'extinktion',
  'extinction',
  'absorbancia',
  'assorbanza',
  'absorvância',
  'absorvancia',
  'absorbância',
  'absorbens',
  'absorptie',
  '吸光度',
]);

function absorbanceWord({ core, plain, words }: Heading): QuantityWord | null {
  const isNamed =
    words.some((word) => absorbanceWords.has(word)) ||
    /optical density|optische dichte|densité optique|densidad óptica/.test(plain) ||
    core === 'A' ||
    core === 'E' ||
    core === 'OD' ||
    core === 'AU' ||
    /^au$|[([]\s*au\s*[)\]]/.test(plain);
  if (!isNamed) return null;
  if (plain.includes('%'))
    return foreign('is an absorptance (the part of the light that is absorbed)');
  if (/(?:×|\*|(?<!\p{L})x)\s?10|10\^/u.test(plain)) return foreign('is scaled by a power of ten');
  return named('absorbance');
}
