import { describe, expect, it } from 'vitest';
import { type SheetSpecies, speciesGlyph, speciesLook } from '../../../analysis/index.ts';
import { lookCount, lookOf } from '../../../analysis/report/species-look.ts';
import { sheet } from './fixture.ts';

const all = Array.from({ length: lookCount }, (_, index) => speciesLook(index));

/** Relative luminance of "#rrggbb"; source: WCAG 2.2, definition of relative luminance. */
function luminance(colour: string): number {
  const [r = 0, g = 0, b = 0] = [1, 3, 5].map((at) => {
    const part = Number.parseInt(colour.slice(at, at + 2), 16) / 255;
    return part <= 0.040_45 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

function contrast(one: string, other: string): number {
  const [dark = 0, light = 0] = [luminance(one), luminance(other)].sort((a, b) => a - b);
  return (light + 0.05) / (dark + 0.05);
}

describe('the looks of species', () => {
  it('can be read as text on white paper and on the dark screen', () => {
    for (const { colour, darkColour } of all) {
      expect(contrast(colour, '#ffffff')).toBeGreaterThan(4.5);
      expect(contrast(darkColour, '#191e21')).toBeGreaterThan(4.5);
    }
  });

  it('differ in colour and in line pattern, one from every other', () => {
    for (const part of ['colour', 'darkColour', 'dash'] as const) {
      expect(new Set(all.map((look) => look[part])).size).toBe(lookCount);
    }
  });

  it('come round again, for any index', () => {
    expect(speciesLook(lookCount + 2)).toBe(speciesLook(2));
    expect(speciesLook(-1)).toBe(speciesLook(lookCount - 1));
  });

  it('go by the place among the absorbing species, not by what was fitted', () => {
    expect(lookOf(sheet, 'chloride')).toBe(speciesLook(0));
    expect(lookOf(sheet, 'other')).toBe(speciesLook(3));
  });
});

describe('the glyph of a species', () => {
  const glyph = (species: Partial<SheetSpecies>, sites = 2): string =>
    speciesGlyph(
      { ...sheet, reaction: { ...sheet.reaction, sites } },
      { id: 'x', cores: 1, arms: 0, ...species },
    );
  const beads = (svg: string): number => svg.match(/fill="currentColor"/g)?.length ?? 0;
  const stubs = (svg: string): number => svg.match(/<line/g)?.length ?? 0;

  it.each([
    [2, 0],
    [2, 1],
    [2, 2],
    [3, 1],
    [3, 3],
    [6, 4],
  ])('with %i sites and %i arms has as many stubs and beads', (sites, arms) => {
    const svg = glyph({ arms }, sites);
    expect([stubs(svg), beads(svg)]).toEqual([sites, arms]);
  });

  it('of an arm is a bead on its stub, of anything else an open square', () => {
    expect(beads(glyph({ cores: 0, arms: 1 }))).toBe(1);
    expect(glyph({ cores: 0, arms: 0 })).toContain('<rect');
  });

  it('has a second ring where more than one core is built in', () => {
    const rings = (cores: number): number =>
      glyph({ cores, arms: 1 }).match(/<circle[^>]*r="(5|2\.2)"/g)?.length ?? 0;
    expect([rings(1), rings(2)]).toEqual([1, 2]);
  });

  it('is drawn with a broken line where it does not absorb', () => {
    expect(glyph({ absorbs: false })).toContain('stroke-dasharray');
    expect(glyph({})).not.toContain('stroke-dasharray');
  });

  it('stays small for any number of sites', () => {
    const svg = glyph({ arms: 40 }, 1e9);
    expect(svg.length).toBeLessThan(500);
    expect(svg).toContain('>40/1000000000<');
  });
});
