import { describe, expect, it } from 'vitest';
import { cividis, cividisCss, cividisTable, type Rgb } from '@/lib/stage-model/cividis';
import { draftScaleAt, draftScaleMaxDeg } from '@/lib/stage-model/draft-scale';

const SAMPLES = Array.from({ length: 65 }, (_, i) => cividis(i / 64));

/** Full loss of one cone type, linear RGB; Machado, Oliveira, Fernandes 2009, severity 1.0 (from memory). */
const VISION: Record<string, number[][]> = {
  normal: [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ],
  protan: [
    [0.152286, 1.052583, -0.204868],
    [0.114503, 0.786281, 0.099216],
    [-0.003882, -0.048116, 1.051998],
  ],
  deutan: [
    [0.367322, 0.860646, -0.227968],
    [0.280085, 0.672501, 0.047413],
    [-0.01182, 0.04294, 0.968881],
  ],
  tritan: [
    [1.255528, -0.076749, -0.178779],
    [-0.078411, 0.930809, 0.147602],
    [0.004733, 0.691367, 0.3039],
  ],
};

/** CIELAB (D65) of an sRGB colour as the given vision sees it; IEC 61966-2-1 and CIE 15. */
function lab(rgb: Rgb, vision: number[][]): [number, number, number] {
  const linear = rgb.map((v) => (v / 255 <= 0.04045 ? v / 255 / 12.92 : ((v / 255 + 0.055) / 1.055) ** 2.4));
  const [r, g, b] = vision.map((row) =>
    Math.min(
      1,
      Math.max(
        0,
        row.reduce((s, m, i) => s + m * linear[i], 0),
      ),
    ),
  );
  const xyz = [
    (0.4124 * r + 0.3576 * g + 0.1805 * b) / 0.95047,
    0.2126 * r + 0.7152 * g + 0.0722 * b,
    (0.0193 * r + 0.1192 * g + 0.9505 * b) / 1.08883,
  ].map((t) => (t > 216 / 24389 ? Math.cbrt(t) : ((24389 / 27) * t + 16) / 116));
  return [116 * xyz[1] - 16, 500 * (xyz[0] - xyz[1]), 200 * (xyz[1] - xyz[2])];
}

describe('cividis', () => {
  it.each(Object.keys(VISION))('grows lighter all the way in CIELAB, %s vision', (name) => {
    const lightness = SAMPLES.map((rgb) => lab(rgb, VISION[name])[0]);
    for (let i = 1; i < lightness.length; i++) expect(lightness[i]).toBeGreaterThan(lightness[i - 1]);
  });

  it.each(Object.keys(VISION))('has ends far apart and even steps, %s vision', (name) => {
    const colours = SAMPLES.map((rgb) => lab(rgb, VISION[name]));
    const distance = (a: number[], b: number[]) => Math.hypot(...a.map((v, i) => v - b[i]));
    expect(distance(colours[0], colours[64])).toBeGreaterThan(60);
    const steps = colours.slice(1).map((c, i) => distance(c, colours[i]));
    const mean = steps.reduce((a, b) => a + b) / steps.length;
    const deviation = Math.sqrt(steps.reduce((s, d) => s + (d - mean) ** 2, 0) / steps.length);
    expect(deviation / mean).toBeLessThan(name === 'normal' ? 0.4 : 0.7);
  });

  it('meets rows of the published table that lie between the kept ones', () => {
    // Rows 100, 190 and 243 of the 256-row table of Nuñez et al. 2018.
    const rows: [number, Rgb][] = [
      [100, [0.394568, 0.406236, 0.438986]],
      [190, [0.728334, 0.674107, 0.427554]],
      [243, [0.954725, 0.858646, 0.259365]],
      [22, [0, 0.193366, 0.441561]],
    ];
    for (const [row, published] of rows) {
      cividis(row / 255).forEach((v, c) => expect(Math.abs(v - published[c] * 255)).toBeLessThan(2.4));
    }
  });

  it('stays at its ends outside 0..1 and on no number', () => {
    expect(cividis(-3)).toEqual(cividis(0));
    expect(cividis(7)).toEqual(cividis(1));
    expect(cividis(NaN)).toEqual(cividis(0));
    expect(cividisCss(0)).toBe('rgb(0 34 78)');
  });

  it('fills a table from end to end', () => {
    const table = cividisTable(256);
    expect(Array.from(table.subarray(0, 4))).toEqual([0, 34, 78, 255]);
    expect(Array.from(table.subarray(255 * 4))).toEqual([254, 232, 56, 255]);
  });
});

describe('the draft scale', () => {
  it('is three limits long, and 15° at least', () => {
    expect([2, 5, 7, 10].map(draftScaleMaxDeg)).toEqual([15, 15, 25, 30]);
  });
  it('holds at its ends', () => {
    expect([-20, 0, 7.5, 15, 90].map((d) => draftScaleAt(d, 15))).toEqual([0, 0, 0.5, 1, 1]);
  });
});
