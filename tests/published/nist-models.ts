/**
 * The models of the nonlinear sets of NIST StRD: the value at x and its derivative by each
 * parameter, in the order of the parameters. Written from the `model` lines of the sets; a test holds
 * the derivatives against differences.
 */
export interface NistModel {
  readonly value: (b: readonly number[], x: readonly number[]) => number;
  readonly slopes: (b: readonly number[], x: readonly number[]) => readonly number[];
  /** What is done to the measured y before it is fitted. */
  readonly of?: (y: number) => number;
}

type OfOne = (b: readonly number[], x: number) => number;
type SlopesOfOne = (b: readonly number[], x: number) => readonly number[];

function ofOne(value: OfOne, slopes: SlopesOfOne): NistModel {
  return {
    value: (b, [x = Number.NaN]) => value(b, x),
    slopes: (b, [x = Number.NaN]) => slopes(b, x),
  };
}

type Numbers = readonly number[];

const at = (b: Numbers, k: number): number => b[k] ?? Number.NaN;

/** Σ amplitude · exp(-rate·x) over pairs from `first`. */
const exponentials = ofOne(
  (b, x) => [0, 2, 4].reduce((sum, k) => sum + at(b, k) * Math.exp(-at(b, k + 1) * x), 0),
  (b, x) =>
    [0, 2, 4].flatMap((k) => {
      const decay = Math.exp(-at(b, k + 1) * x);
      return [decay, -at(b, k) * x * decay];
    }),
);

const chwirut = ofOne(
  ([b1 = 0, b2 = 0, b3 = 0], x) => Math.exp(-b1 * x) / (b2 + b3 * x),
  ([b1 = 0, b2 = 0, b3 = 0], x) => {
    const below = b2 + b3 * x;
    const y = Math.exp(-b1 * x) / below;
    return [-x * y, -y / below, (-x * y) / below];
  },
);

const gauss = ofOne(
  (b, x) =>
    at(b, 0) * Math.exp(-at(b, 1) * x) +
    [2, 5].reduce(
      (sum, k) => sum + at(b, k) * Math.exp(-(((x - at(b, k + 1)) / at(b, k + 2)) ** 2)),
      0,
    ),
  (b, x) => {
    const decay = Math.exp(-at(b, 1) * x);
    const bands = [2, 5].flatMap((k) => {
      const width = at(b, k + 2);
      const away = (x - at(b, k + 1)) / width;
      const band = Math.exp(-(away ** 2));
      const steep = (2 * at(b, k) * band * away) / width;
      return [band, steep, steep * away];
    });
    return [decay, -at(b, 0) * x * decay, ...bands];
  },
);

/** A polynomial of `above` coefficients over 1 + a polynomial without constant term. */
function rational(above: number, below: number): NistModel {
  const parts = (b: Numbers, x: number) => {
    let over = 0;
    for (let k = above - 1; k >= 0; k--) over = over * x + at(b, k);
    let under = 0;
    for (let k = above + below - 1; k >= above; k--) under = (under + at(b, k)) * x;
    return { over, under: 1 + under };
  };
  return ofOne(
    (b, x) => {
      const { over, under } = parts(b, x);
      return over / under;
    },
    (b, x) => {
      const { over, under } = parts(b, x);
      return [
        ...Array.from({ length: above }, (_, k) => x ** k / under),
        ...Array.from({ length: below }, (_, k) => (-over / under ** 2) * x ** (k + 1)),
      ];
    },
  );
}

const enso = ofOne(
  (b, x) =>
    at(b, 0) +
    [
      [1, 2, 12],
      [4, 5, at(b, 3)],
      [7, 8, at(b, 6)],
    ].reduce((sum, [c = 0, s = 0, period = 0]) => {
      const angle = (2 * Math.PI * x) / period;
      return sum + at(b, c) * Math.cos(angle) + at(b, s) * Math.sin(angle);
    }, 0),
  (b, x) => {
    const year = (2 * Math.PI * x) / 12;
    const free = [3, 6].flatMap((k) => {
      const angle = (2 * Math.PI * x) / at(b, k);
      const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
      return [(angle / at(b, k)) * (at(b, k + 1) * sin - at(b, k + 2) * cos), cos, sin];
    });
    return [1, Math.cos(year), Math.sin(year), ...free];
  },
);

export const nistModels: Readonly<Record<string, NistModel>> = {
  Bennett5: ofOne(
    ([b1 = 0, b2 = 0, b3 = 0], x) => b1 * (b2 + x) ** (-1 / b3),
    ([b1 = 0, b2 = 0, b3 = 0], x) => {
      const power = (b2 + x) ** (-1 / b3);
      return [power, (-b1 * power) / (b3 * (b2 + x)), (b1 * power * Math.log(b2 + x)) / b3 ** 2];
    },
  ),
  BoxBOD: saturating(),
  Chwirut1: chwirut,
  Chwirut2: chwirut,
  DanWood: ofOne(
    ([b1 = 0, b2 = 0], x) => b1 * x ** b2,
    ([b1 = 0, b2 = 0], x) => [x ** b2, b1 * x ** b2 * Math.log(x)],
  ),
  ENSO: enso,
  Eckerle4: ofOne(
    ([b1 = 0, b2 = 0, b3 = 0], x) => (b1 / b2) * Math.exp(-(((x - b3) / b2) ** 2) / 2),
    ([b1 = 0, b2 = 0, b3 = 0], x) => {
      const away = (x - b3) / b2;
      const band = Math.exp(-(away ** 2) / 2) / b2;
      return [band, (b1 * band * (away ** 2 - 1)) / b2, (b1 * band * away) / b2];
    },
  ),
  Gauss1: gauss,
  Gauss2: gauss,
  Gauss3: gauss,
  Hahn1: rational(4, 3),
  Kirby2: rational(3, 2),
  Lanczos1: exponentials,
  Lanczos2: exponentials,
  Lanczos3: exponentials,
  MGH09: ofOne(
    ([b1 = 0, b2 = 0, b3 = 0, b4 = 0], x) => (b1 * (x ** 2 + x * b2)) / (x ** 2 + x * b3 + b4),
    ([b1 = 0, b2 = 0, b3 = 0, b4 = 0], x) => {
      const over = x ** 2 + x * b2;
      const under = x ** 2 + x * b3 + b4;
      const y = (b1 * over) / under;
      return [over / under, (b1 * x) / under, (-y * x) / under, -y / under];
    },
  ),
  MGH10: ofOne(
    ([b1 = 0, b2 = 0, b3 = 0], x) => b1 * Math.exp(b2 / (x + b3)),
    ([b1 = 0, b2 = 0, b3 = 0], x) => {
      const rise = Math.exp(b2 / (x + b3));
      return [rise, (b1 * rise) / (x + b3), (-b1 * rise * b2) / (x + b3) ** 2];
    },
  ),
  MGH17: ofOne(
    ([b1 = 0, b2 = 0, b3 = 0, b4 = 0, b5 = 0], x) =>
      b1 + b2 * Math.exp(-x * b4) + b3 * Math.exp(-x * b5),
    ([, b2 = 0, b3 = 0, b4 = 0, b5 = 0], x) => {
      const [one, two] = [Math.exp(-x * b4), Math.exp(-x * b5)];
      return [1, one, two, -b2 * x * one, -b3 * x * two];
    },
  ),
  Misra1a: saturating(),
  Misra1b: ofOne(
    ([b1 = 0, b2 = 0], x) => b1 * (1 - (1 + (b2 * x) / 2) ** -2),
    ([b1 = 0, b2 = 0], x) => [1 - (1 + (b2 * x) / 2) ** -2, b1 * x * (1 + (b2 * x) / 2) ** -3],
  ),
  Misra1c: ofOne(
    ([b1 = 0, b2 = 0], x) => b1 * (1 - (1 + 2 * b2 * x) ** -0.5),
    ([b1 = 0, b2 = 0], x) => [1 - (1 + 2 * b2 * x) ** -0.5, b1 * x * (1 + 2 * b2 * x) ** -1.5],
  ),
  Misra1d: ofOne(
    ([b1 = 0, b2 = 0], x) => (b1 * b2 * x) / (1 + b2 * x),
    ([b1 = 0, b2 = 0], x) => [(b2 * x) / (1 + b2 * x), (b1 * x) / (1 + b2 * x) ** 2],
  ),
  Nelson: {
    of: Math.log,
    value: ([b1 = 0, b2 = 0, b3 = 0], [x1 = 0, x2 = 0]) => b1 - b2 * x1 * Math.exp(-b3 * x2),
    slopes: ([, b2 = 0, b3 = 0], [x1 = 0, x2 = 0]) => {
      const decay = x1 * Math.exp(-b3 * x2);
      return [1, -decay, b2 * x2 * decay];
    },
  },
  Rat42: ofOne(
    ([b1 = 0, b2 = 0, b3 = 0], x) => b1 / (1 + Math.exp(b2 - b3 * x)),
    ([b1 = 0, b2 = 0, b3 = 0], x) => {
      const rise = Math.exp(b2 - b3 * x);
      const steep = (b1 * rise) / (1 + rise) ** 2;
      return [1 / (1 + rise), -steep, x * steep];
    },
  ),
  Rat43: ofOne(
    ([b1 = 0, b2 = 0, b3 = 0, b4 = 0], x) => b1 / (1 + Math.exp(b2 - b3 * x)) ** (1 / b4),
    ([b1 = 0, b2 = 0, b3 = 0, b4 = 0], x) => {
      const rise = Math.exp(b2 - b3 * x);
      const share = (1 + rise) ** (-1 / b4);
      const steep = (b1 * share * rise) / (1 + rise) / b4;
      return [share, -steep, x * steep, (b1 * share * Math.log(1 + rise)) / b4 ** 2];
    },
  ),
  Roszman1: ofOne(
    ([b1 = 0, b2 = 0, b3 = 0, b4 = 0], x) => b1 - b2 * x - Math.atan(b3 / (x - b4)) / Math.PI,
    ([, , b3 = 0, b4 = 0], x) => {
      const under = Math.PI * ((x - b4) ** 2 + b3 ** 2);
      return [1, -x, -(x - b4) / under, -b3 / under];
    },
  ),
  Thurber: rational(4, 3),
};

/** Misra1a and BoxBOD. */
function saturating(): NistModel {
  return ofOne(
    ([b1 = 0, b2 = 0], x) => b1 * (1 - Math.exp(-b2 * x)),
    ([b1 = 0, b2 = 0], x) => [1 - Math.exp(-b2 * x), b1 * x * Math.exp(-b2 * x)],
  );
}
