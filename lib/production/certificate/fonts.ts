import { createRequire } from 'node:module';
import { Font } from '@react-pdf/renderer';
import * as fontkit from 'fontkit';

const require = createRequire(import.meta.url);
const file = (family: string, subset: string, weight: number) =>
  require.resolve(`@fontsource/${family}/files/${family}-${subset}-${weight}-normal.woff`);

/** Text, and the figures and digests; each with the Latin extensions that names of people need. */
export const sans = ['Text', 'TextExt'];
export const mono = ['Figures', 'FiguresExt'];

let glyphs: fontkit.Font[] = [];

/** Registers the shipped fonts, once a process. Nothing is fetched. */
export function registerFonts(): void {
  if (glyphs.length) return;
  for (const [family, name, weights] of [
    ['instrument-sans', 'Text', [400, 600]],
    ['martian-mono', 'Figures', [400, 500]],
  ] as const)
    for (const [subset, suffix] of [
      ['latin', ''],
      ['latin-ext', 'Ext'],
    ] as const)
      Font.register({
        family: `${name}${suffix}`,
        fonts: weights.map((fontWeight) => ({ src: file(family, subset, fontWeight), fontWeight })),
      });
  // Words stay whole; digests are broken where we say so.
  Font.registerHyphenationCallback((word) => [word]);
  glyphs = ['latin', 'latin-ext'].map(
    (subset) => fontkit.openSync(file('instrument-sans', subset, 400)) as fontkit.Font,
  );
}

const spelled: Record<string, string> = { '≥': '>=', '≤': '<=', '→': '->', '²': '2', '³': '3' };

/** Text as these fonts can draw it; a character that none of them has becomes "?", never nothing. */
export function drawable(text: string): string {
  const has = (char: string) => glyphs.some((font) => font.hasGlyphForCodePoint(char.codePointAt(0)!));
  return Array.from(text.normalize('NFC'), (char) =>
    /\s/.test(char) || has(char) ? char : (spelled[char] ?? '?'),
  ).join('');
}
