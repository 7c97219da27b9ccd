/**
 * cividis, a scale of even lightness steps that reads alike with and without red-green colour vision.
 * Source: Nuñez, Anderton, Renslow 2018, PLoS ONE 13(7) e0199239; rows of the published 256-row table
 * (position in the table, then sRGB 0..1), straight lines between them: within 1.2/255 of the full table.
 */
const KNOTS: readonly (readonly [number, number, number, number])[] = [
  [0, 0, 0.135112, 0.304751],
  [8, 0, 0.157932, 0.357521],
  [16, 0, 0.178802, 0.414764],
  [20, 0, 0.188769, 0.439563],
  [24, 0.017852, 0.198528, 0.441248],
  [32, 0.103401, 0.220406, 0.43579],
  [40, 0.154261, 0.242475, 0.43012],
  [48, 0.195057, 0.264372, 0.425924],
  [56, 0.230871, 0.286134, 0.423498],
  [64, 0.263738, 0.307831, 0.422789],
  [72, 0.294669, 0.329531, 0.423716],
  [80, 0.32425, 0.351289, 0.42625],
  [88, 0.352892, 0.373153, 0.430226],
  [96, 0.38083, 0.395164, 0.435653],
  [104, 0.408226, 0.417357, 0.44257],
  [112, 0.435168, 0.439763, 0.451134],
  [120, 0.461616, 0.462405, 0.461969],
  [128, 0.488697, 0.485318, 0.471008],
  [136, 0.51792, 0.508454, 0.472707],
  [144, 0.54784, 0.531895, 0.471704],
  [152, 0.578236, 0.555673, 0.468724],
  [160, 0.609105, 0.579816, 0.463638],
  [168, 0.640352, 0.604354, 0.456791],
  [176, 0.671991, 0.629316, 0.448018],
  [184, 0.704037, 0.654731, 0.437147],
  [192, 0.736488, 0.680629, 0.424028],
  [200, 0.769353, 0.707035, 0.408516],
  [208, 0.802667, 0.733978, 0.390153],
  [216, 0.836429, 0.761483, 0.368747],
  [224, 0.870717, 0.789572, 0.343333],
  [232, 0.905589, 0.818257, 0.312889],
  [240, 0.941147, 0.84753, 0.275815],
  [248, 0.97778, 0.877281, 0.227954],
  [252, 0.994847, 0.892954, 0.203445],
  [255, 0.995737, 0.909344, 0.217772],
];

export type Rgb = [number, number, number];

/** sRGB (0..255, not rounded) at t in 0..1; t outside is clamped, NaN reads as 0. */
export function cividis(t: number): Rgb {
  const at = Math.min(1, Math.max(0, t || 0)) * 255;
  let i = 1;
  while (KNOTS[i][0] < at) i++;
  const low = KNOTS[i - 1];
  const high = KNOTS[i];
  const f = (at - low[0]) / (high[0] - low[0]);
  return [1, 2, 3].map((c) => (low[c] + (high[c] - low[c]) * f) * 255) as Rgb;
}

/** The scale as `size` RGBA texels (bytes), first texel t = 0, last t = 1. */
export function cividisTable(size = 256): Uint8Array<ArrayBuffer> {
  const table = new Uint8Array(size * 4);
  for (let i = 0; i < size; i++) {
    const [r, g, b] = cividis(i / (size - 1));
    table.set([Math.round(r), Math.round(g), Math.round(b), 255], i * 4);
  }
  return table;
}

/** CSS colour at t in 0..1. */
export function cividisCss(t: number): string {
  return `rgb(${cividis(t).map(Math.round).join(' ')})`;
}
