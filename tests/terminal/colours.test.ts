import { describe, expect, it } from 'vitest';
import { seriesColour, seriesColours } from '../../src/terminal/colours.js';

/** Contrast ratio as WCAG 2.2 defines it ("contrast ratio", "relative luminance"). */
function contrast(a: string, b: string): number {
  const luminance = (hex: string) =>
    [1, 3, 5]
      .map((at) => Number.parseInt(hex.slice(at, at + 2), 16) / 255)
      .map((part) => (part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4))
      .reduce((sum, part, index) => sum + part * ([0.2126, 0.7152, 0.0722][index] ?? 0), 0);
  const [light, dark] = [luminance(a), luminance(b)].sort((x, y) => y - x) as [number, number];
  return (light + 0.05) / (dark + 0.05);
}

describe('colours of curves', () => {
  it('are none without colour, names with 16, the Okabe and Ito set above', () => {
    expect(seriesColour(0, 0)).toBeUndefined();
    expect(seriesColour(0, 1)).toBe('red');
    expect(seriesColour(0, 2)).toBe('#d55e00');
    expect(seriesColour(6, 3)).toBe(seriesColour(0, 3));
  });

  it('differ from one another', () => {
    for (const level of [1, 2, 3] as const) expect(new Set([0, 1, 2, 3, 4, 5].map((index) => seriesColour(index, level))).size).toBe(6);
  });

  // WCAG 2.2, 1.4.11: graphics need a contrast of 3 to 1.
  it('can be seen on black and on white, the first three', () => {
    for (const colour of seriesColours.slice(0, 3)) {
      expect(contrast(colour, '#000000')).toBeGreaterThan(3);
      expect(contrast(colour, '#ffffff')).toBeGreaterThan(3);
    }
  });
});
