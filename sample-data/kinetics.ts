/** Amounts of the three cores, per core charged. */
export interface Cores {
  readonly core: number;
  readonly mono: number;
  readonly bis: number;
}

/**
 * Two successive substitutions of one core, second order each, well mixed with the arm fed in:
 * mono = (x^κ - x)/(1 - κ), bis = 1 - x - mono, x the fraction of the core that is left. The path
 * depends on κ and on the arms taken up alone, so any side loss of the arm leaves it as it is.
 *
 * @param kappa k₂/k₁, not 1.
 * @param armsTaken arms built into products, per core charged; 0 to 2.
 */
export function armIntoCore(kappa: number, armsTaken: number): Cores {
  const at = (x: number): Cores => {
    const mono = (x ** kappa - x) / (1 - kappa);
    return { core: x, mono, bis: 1 - x - mono };
  };
  // Arms taken fall steadily as x rises, so halving the interval cannot fail; 200 halvings reach
  // the last bit even of an x that is far below 1.
  let low = 0;
  let high = 1;
  for (let step = 0; step < 200; step++) {
    const x = (low + high) / 2;
    const { mono, bis } = at(x);
    if (mono + 2 * bis > armsTaken) low = x;
    else high = x;
  }
  return at((low + high) / 2);
}

/** One addition of core to arm. Amounts per core charged, times in addition times, volumes in final volumes. */
export interface CoreFedIntoArm {
  readonly kappa: number;
  /** Arm laid before, per core charged in all. */
  readonly equivalents: number;
  /** k₁ · (core charged / final volume) · (time of addition). */
  readonly k1ConcentrationTime: number;
  /** Share of the final volume that is in the flask before the addition. */
  readonly startVolumeShare: number;
  /** Stirring after the end of the addition, in times of addition. */
  readonly hold: number;
}

export interface FedCores extends Cores {
  readonly arm: number;
  readonly armLost: number;
}

type State = readonly [core: number, mono: number, bis: number, arm: number, lost: number];

const stepsPerStage = 3000;

/** Ends of the semi-batch run by the classical fourth-order Runge-Kutta method; loss of arm of first order. */
export function coreFedIntoArm(run: CoreFedIntoArm, lossPerAddition: number): FedCores {
  const start: State = [0, 0, 0, run.equivalents, 0];
  const fed = advance(start, 1, (state, time) =>
    slope(run, lossPerAddition, state, {
      feed: 1,
      volume: run.startVolumeShare + (1 - run.startVolumeShare) * time,
    }),
  );
  const [core, mono, bis, arm, armLost] = advance(fed, run.hold, (state) =>
    slope(run, lossPerAddition, state, { feed: 0, volume: 1 }),
  );
  return { core, mono, bis, arm, armLost };
}

/** The rate of the loss (per time of addition) with which the stated share of the arm is lost at the end. */
export function lossRateFor(run: CoreFedIntoArm, shareLost: number): number {
  let low = 0;
  let high = 1;
  // 40 halvings: far below the digits that are printed anywhere.
  for (let step = 0; step < 40; step++) {
    const middle = (low + high) / 2;
    if (coreFedIntoArm(run, middle).armLost / run.equivalents < shareLost) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

interface Flask {
  readonly feed: number;
  readonly volume: number;
}

function slope(run: CoreFedIntoArm, lossPerAddition: number, state: State, flask: Flask): State {
  const [core, mono, , arm] = state;
  const first = (run.k1ConcentrationTime * core * arm) / flask.volume;
  const second = (run.kappa * run.k1ConcentrationTime * mono * arm) / flask.volume;
  const lost = lossPerAddition * arm;
  return [flask.feed - first, first - second, second, -first - second - lost, lost];
}

function advance(
  start: State,
  duration: number,
  slopeAt: (state: State, time: number) => State,
): State {
  const h = duration / stepsPerStage;
  let state = start;
  for (let step = 0; step < stepsPerStage; step++) {
    const time = step * h;
    const a = slopeAt(state, time);
    const b = slopeAt(along(state, a, h / 2), time + h / 2);
    const c = slopeAt(along(state, b, h / 2), time + h / 2);
    const d = slopeAt(along(state, c, h), time + h);
    state = along(along(along(along(state, a, h / 6), b, h / 3), c, h / 3), d, h / 6);
  }
  return state;
}

function along(from: State, by: State, length: number): State {
  return [
    from[0] + length * by[0],
    from[1] + length * by[1],
    from[2] + length * by[2],
    from[3] + length * by[3],
    from[4] + length * by[4],
  ];
}
