/** y = intercept + slope · x, with what the noise of both leaves open. */
export interface StraightLine {
  readonly slope: number;
  readonly intercept: number;
  readonly slopeVariance: number;
  readonly interceptVariance: number;
}

/** Points with noise in both coordinates; arrays of one length. */
export interface NoisyPoints {
  readonly x: Float64Array;
  readonly y: Float64Array;
  readonly sdX: Float64Array;
  readonly sdY: Float64Array;
}

const mostRounds = 30;
const settled = 1e-12;
const fewestPoints = 4;

/**
 * The straight line through points that are noisy in both coordinates (York, Am. J. Phys. 72 (2004)
 * 367, errors of x and y independent): an ordinary fit would take the slope too small.
 * Null where the points do not fix a rising line.
 *
 * @param heldSlope a slope to keep; the constant alone is then found
 */
export function straightLine(points: NoisyPoints, heldSlope?: number): StraightLine | null {
  const { x, y, sdX, sdY } = points;
  if (x.length < fewestPoints) return null;
  let slope = heldSlope ?? ordinarySlope(x, y);
  for (let round = 0; ; round++) {
    const { weight, meanX, meanY, total } = weighted(points, slope);
    let [top, bottom, betaSum, betaSquares] = [0, 0, 0, 0];
    for (let i = 0; i < x.length; i++) {
      const [u, v] = [x[i]! - meanX, y[i]! - meanY];
      const beta = weight[i]! * (u * sdY[i]! ** 2 + slope * v * sdX[i]! ** 2);
      top += weight[i]! * beta * v;
      bottom += weight[i]! * beta * u;
      betaSum += weight[i]! * beta;
      betaSquares += weight[i]! * beta * beta;
    }
    const next = heldSlope ?? top / bottom;
    const isSettled = Math.abs(next - slope) <= settled * Math.abs(slope);
    slope = next;
    const spread = betaSquares - betaSum ** 2 / total;
    if (!(slope > 0 && spread > 0 && Number.isFinite(slope))) return null;
    if (!isSettled && round < mostRounds) continue;
    return {
      slope,
      intercept: meanY - slope * meanX,
      slopeVariance: 1 / spread,
      interceptVariance:
        1 / total + (heldSlope === undefined ? (meanX + betaSum / total) ** 2 / spread : 0),
    };
  }
}

function weighted({ x, y, sdX, sdY }: NoisyPoints, slope: number) {
  const weight = new Float64Array(x.length);
  let [total, sumX, sumY] = [0, 0, 0];
  for (let i = 0; i < x.length; i++) {
    weight[i] = 1 / (sdY[i]! ** 2 + slope * slope * sdX[i]! ** 2);
    total += weight[i]!;
    sumX += weight[i]! * x[i]!;
    sumY += weight[i]! * y[i]!;
  }
  return { weight, total, meanX: sumX / total, meanY: sumY / total };
}

/** A slope to start from: good enough where the noise is small against the spread of x. */
function ordinarySlope(x: Float64Array, y: Float64Array): number {
  let [sumX, sumY] = [0, 0];
  for (let i = 0; i < x.length; i++) {
    sumX += x[i]!;
    sumY += y[i]!;
  }
  const [meanX, meanY] = [sumX / x.length, sumY / x.length];
  let [xx, xy] = [0, 0];
  for (let i = 0; i < x.length; i++) {
    xx += (x[i]! - meanX) ** 2;
    xy += (x[i]! - meanX) * (y[i]! - meanY);
  }
  return xy / xx;
}
