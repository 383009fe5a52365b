/** More rows than this nobody reads. */
const mostRows = 60;

function step(points: number): number {
  return Math.max(1, Math.ceil(points / mostRows));
}

/** Positions of the points that a table of a plot shows: every k-th. */
export function tableRows(points: number): number[] {
  const every = step(points);
  return Array.from({ length: Math.ceil(points / every) }, (_, row) => row * every);
}

/** Says so: "Every point", "Every 4th of 221 points". */
export function thinningText(points: number): string {
  const every = step(points);
  return every === 1 ? 'Every point' : `Every ${ordinal(every)} of ${points} points`;
}

function ordinal(count: number): string {
  const isTeen = count % 100 >= 11 && count % 100 <= 13;
  const ending = isTeen ? 'th' : (['th', 'st', 'nd', 'rd'][count % 10] ?? 'th');
  return `${count}${ending}`;
}
