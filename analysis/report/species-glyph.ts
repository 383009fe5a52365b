import type { Sheet, SheetSpecies } from '../sheet/schema.ts';

/**
 * The glyph of a species as SVG text (no text of the user in it): a ring with one stub per site, a
 * filled bead on each stub that carries an arm; an arm alone is a bead on a stub; what is neither is
 * an open square. What does not absorb is drawn with a broken line.
 */
export function speciesGlyph(sheet: Sheet, species: SheetSpecies): string {
  const broken = species.absorbs === false ? ' stroke-dasharray="2 1.6"' : '';
  const shape = species.cores > 0 ? ring(sheet.reaction.sites, species.arms) : withoutCore(species);
  return `<svg viewBox="0 0 28 28" width="22" height="22" aria-hidden="true" focusable="false"><g fill="none" stroke="currentColor" stroke-width="1.6"${broken}>${shape}</g></svg>`;
}

function ring(sites: number, arms: number): string {
  const stubs = Array.from({ length: sites }, (_, site) => {
    // two sites lie left and right; more go round from the left
    const angle = Math.PI + (2 * Math.PI * site) / sites;
    const [x, y] = [Math.cos(angle), Math.sin(angle)];
    const at = (radius: number) =>
      [14 + radius * x, 14 + radius * y].map((value) => value.toFixed(1));
    const [[x1, y1], [x2, y2]] = [at(5), at(9)];
    const bead =
      site < arms
        ? `<circle cx="${at(10.5)[0]}" cy="${at(10.5)[1]}" r="2.7" fill="currentColor" stroke="none"/>`
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
