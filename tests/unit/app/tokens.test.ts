import { describe, expect, it } from 'vitest';
import { colours, shapePairs, textPairs } from '@/tailwind.config';

/** Relative luminance of sRGB `#rrggbb`, WCAG 2.2 definition. */
function luminance(hex: string): number {
  const [r, g, b] = [1, 3, 5]
    .map((at) => Number.parseInt(hex.slice(at, at + 2), 16) / 255)
    .map((c) => (c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4));
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

/** Contrast ratio, WCAG 2.2 definition: 1 to 21. */
function contrast(a: string, b: string): number {
  const [light, dark] = [luminance(a), luminance(b)].sort((x, y) => y - x);
  return (light + 0.05) / (dark + 0.05);
}

describe('contrast itself', () => {
  it('is 21 for black on white and 1 for a colour on itself', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 10);
    expect(contrast('#1f6f66', '#1f6f66')).toBe(1);
  });

  it('puts #767676 on white just above the AA limit and #777777 just below', () => {
    expect(contrast('#767676', '#ffffff')).toBeGreaterThanOrEqual(4.5);
    expect(contrast('#777777', '#ffffff')).toBeLessThan(4.5);
  });
});

describe.each(['light', 'dark'] as const)('%s theme', (theme) => {
  const family = colours[theme];

  it.each(textPairs)('text %s on %s reaches 4.5:1 (WCAG 2.2, 1.4.3)', (text, ground) => {
    expect(contrast(family[text], family[ground])).toBeGreaterThanOrEqual(4.5);
  });

  it.each(shapePairs)('shape %s on %s reaches 3:1 (WCAG 2.2, 1.4.11)', (shape, ground) => {
    expect(contrast(family[shape], family[ground])).toBeGreaterThanOrEqual(3);
  });
});

describe('themes', () => {
  it('name the same tokens, all as #rrggbb', () => {
    expect(Object.keys(colours.dark)).toEqual(Object.keys(colours.light));
    for (const value of [...Object.values(colours.light), ...Object.values(colours.dark)]) {
      expect(value).toMatch(/^#[0-9a-f]{6}$/);
    }
  });

  it('keep the colours that the product is described with', () => {
    expect(colours.light).toMatchObject({
      paper: '#f7f5f0',
      ink: '#1d2321',
      rule: '#d9d4c7',
      verdigris: '#1f6f66',
      madder: '#a2352b',
      ochre: '#a86b12',
      slate: '#56616b',
    });
  });
});
