import type { Sheet, SheetSpecies } from '../sheet/schema.ts';

/** More stubs than this would run into each other: the counts are written instead. */
const mostStubs = 8;

/**
 * The glyph of a species as SVG text (no text of the user in it): a ring with one stub per site, a
 * filled bead on each stub that carries an arm; an arm alone is a bead on a stub; what is neither is
 * an open square. What does not absorb is drawn with a broken line; a second ring inside the first
 * says that more than one core is built in.
 */
export function speciesGlyph(sheet: Sheet, species: SheetSpecies): string {
  const broken = species.absorbs === false ? ' stroke-dasharray="2 1.6"' : '';
  const shape = species.cores > 0 ? withCore(sheet.reaction.sites, species) : withoutCore(species);
  return `<svg viewBox="0 0 28 28" width="22" height="22" aria-hidden="true" focusable="false"><g fill="none" stroke="currentColor" stroke-width="1.6"${broken}>${shape}</g></svg>`;
}

function withCore(sitesOfOne: number, { cores, arms }: SheetSpecies): string {
  const sites = sitesOfOne * cores;
  if (Math.max(sites, arms) > mostStubs) {
    return `<circle cx="14" cy="10" r="5"/><text x="14" y="26" font-size="9" text-anchor="middle" fill="currentColor" stroke="none">${arms}/${sites}</text>`;
  }
  const inner = cores > 1 ? '<circle cx="14" cy="14" r="2.2"/>' : '';
  return ring(Math.max(sites, arms), arms) + inner;
}

function ring(sites: number, arms: number): string {
  const stubs = Array.from({ length: sites }, (_, site) => {
    // two sites lie left and right; more go round from the left
    const angle = Math.PI + (2 * Math.PI * site) / sites;
    const [x, y] = [Math.cos(angle), Math.sin(angle)];
    const at = (radius: number) =>
      [14 + radius * x, 14 + radius * y].map((value) => value.toFixed(1));
    const [[x1, y1], [x2, y2], [cx, cy]] = [at(5), at(9), at(10.5)];
    const bead =
      site < arms
        ? `<circle cx="${cx}" cy="${cy}" r="2.7" fill="currentColor" stroke="none"/>`
        : '';
    return `<line x1="${x1}" y1="${y1}" x2="${x2}" y2="${y2}"/>${bead}`;
  });
  return `<circle cx="14" cy="14" r="5"/>${stubs.join('')}`;
}

function withoutCore({ arms }: SheetSpecies): string {
  return arms > 0
    ? '<line x1="7" y1="14" x2="13" y2="14"/><circle cx="16" cy="14" r="3.6" fill="currentColor" stroke="none"/>'
    : '<rect x="9.5" y="9.5" width="9" height="9"/>';
}
