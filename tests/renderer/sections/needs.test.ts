import { describe, expect, it } from 'vitest';
import { newSheet, type Sheet, setReaction, updateSpecies } from '../../../analysis/index.ts';
import { reactionNeeds } from '../../../renderer/sections/reaction/reaction-needs.ts';

const needs = (sheet: Sheet): string | null => reactionNeeds(sheet);

describe('what the reaction still needs', () => {
  it('is nothing in a new sheet', () => {
    expect(needs(newSheet())).toBeNull();
  });

  it('is a core and an arm that differ', () => {
    expect(needs(setReaction(newSheet(), { arm: 'core' }))).toContain('two different species');
  });

  it('is a core that is one core, and an arm that is one arm', () => {
    expect(needs(updateSpecies(newSheet(), 'core', { arms: 1 }))).toContain('0 arms in core');
    expect(needs(updateSpecies(newSheet(), 'arm', { arms: 2 }))).toContain('1 arm in arm');
  });

  it('is a site for every arm', () => {
    expect(needs(setReaction(newSheet(), { sites: 1 }))).toContain('fewer arms in bis');
  });

  it('is two products', () => {
    expect(needs(updateSpecies(newSheet(), 'bis', { cores: 0 }))).toContain('two products');
  });
});
