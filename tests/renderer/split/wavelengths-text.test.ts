import { describe, expect, it } from 'vitest';
import { wavelengthsText } from '../../../renderer/sections/split/wavelengths-text.ts';

describe('the wavelengths of a doubt', () => {
  it('are ranges, single ones by themselves, tenths where there are any', () => {
    expect(wavelengthsText([298, 330])).toBe('298–330 nm');
    expect(wavelengthsText([300, 300, 310.5, 312])).toBe('300, 310.5–312 nm');
  });

  it('are counted where they are many', () => {
    const many = Array.from({ length: 7 }, (_, i) => [300 + 10 * i, 305 + 10 * i]).flat();
    expect(wavelengthsText(many)).toBe('300–305, 310–315, 320–325, 330–335 nm and 3 more');
  });
});
