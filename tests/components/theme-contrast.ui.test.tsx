import { describe, expect, it } from 'vitest';
import { stylesheet } from '@/components/theme/stylesheet.ts';
import { temperatureColour, temperatureStops, temperatureWord } from '@/components/theme/temperature.ts';
import { palettes, type Role } from '@/components/theme/tokens.ts';

/** WCAG 2.2, definition of relative luminance (sRGB). */
function luminance(hex: string): number {
  const [r = 0, g = 0, b = 0] = [1, 3, 5]
    .map((at) => Number.parseInt(hex.slice(at, at + 2), 16) / 255)
    .map((value) => (value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4));
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

function contrast(a: string, b: string): number {
  const [brighter = 0, darker = 0] = [luminance(a), luminance(b)].sort((p, q) => q - p);
  return (brighter + 0.05) / (darker + 0.05);
}

const texts: readonly Role[] = ['ink', 'softInk', 'ember', 'cold', 'hot', 'good', 'wrong'];
const surfaces: readonly Role[] = ['ground', 'sheet', 'touched'];

describe.each(['light', 'night'] as const)('the %s theme', (name) => {
  const palette = palettes[name];

  it.each(texts.flatMap((text) => surfaces.map((surface) => [text, surface] as const)))(
    'reads %s on %s at 4.5 to 1 or better',
    (text, surface) => {
      expect(contrast(palette[text], palette[surface])).toBeGreaterThanOrEqual(4.5);
    },
  );

  it.each(surfaces)('reads ink on %s at 7 to 1 or better, as operators need it in glare', (surface) => {
    expect(contrast(palette.ink, palette[surface])).toBeGreaterThanOrEqual(7);
  });

  it('reads the label of the main action at 4.5 to 1, under a pointer too', () => {
    expect(contrast(palette.onEmber, palette.ember)).toBeGreaterThanOrEqual(4.5);
    expect(contrast(palette.onEmber, palette.emberDeep)).toBeGreaterThanOrEqual(4.5);
  });

  it.each(surfaces)('shows the focus ring on %s at 3 to 1 or better', (surface) => {
    expect(contrast(palette.cold, palette[surface])).toBeGreaterThanOrEqual(3);
  });
});

describe('the stylesheet of an exported page', () => {
  it('carries both palettes and chooses neither', () => {
    for (const palette of Object.values(palettes)) {
      for (const value of Object.values(palette)) expect(stylesheet).toContain(value);
    }
    expect(stylesheet).not.toMatch(/<html[^>]*data-theme/);
  });
});

describe('the temperature scale', () => {
  it('gives each stop its own colour', () => {
    for (const stop of temperatureStops) {
      const rgb = [1, 3, 5].map((at) => Number.parseInt(stop.colour.slice(at, at + 2), 16));
      expect(temperatureColour(stop.celsius + 273.15)).toBe(`rgb(${rgb.join(', ')})`);
    }
  });

  it('is held at its ends', () => {
    expect(temperatureColour(3000)).toBe(temperatureColour(1300 + 273.15));
    expect(temperatureColour(200)).toBe(temperatureColour(20 + 273.15));
  });

  it('names a colour by the last stop that was reached', () => {
    expect(temperatureWord(299 + 273.15)).toBe('purple');
    expect(temperatureWord(301 + 273.15)).toBe('blue');
  });
});
