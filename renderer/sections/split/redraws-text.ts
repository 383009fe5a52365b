import { numberText } from '../../../analysis/index.ts';

export function drawsText(draws: number): string {
  return `${numberText(draws, 0)} redraws`;
}

interface Progress {
  readonly done: number;
  readonly of: number;
  readonly elapsedMs: number;
}

/** Too few done to tell how long the rest will take. */
const fewestToTell = 10;

/** "1 250 of 2 000, about 8 s left"; minutes from two on. */
export function timeLeftText({ done, of, elapsedMs }: Progress): string {
  const sofar = `${numberText(done, 0)} of ${numberText(of, 0)}`;
  if (done < fewestToTell) return sofar;
  const seconds = Math.ceil(((of - done) * elapsedMs) / done / 1000);
  const left = seconds < 120 ? `${seconds} s` : `${Math.ceil(seconds / 60)} min`;
  return `${sofar}, about ${left} left`;
}
