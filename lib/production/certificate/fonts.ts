import { createRequire } from 'node:module';
import { Font } from '@react-pdf/renderer';
import * as fontkit from 'fontkit';

const require = createRequire(import.meta.url);
const file = (family: string, style: string, name: string) =>
  require.resolve(`@expo-google-fonts/${family}/${style}/${name}_${style}.ttf`);
const text = { 400: file('instrument-sans', '400Regular', 'InstrumentSans'), 600: file('instrument-sans', '600SemiBold', 'InstrumentSans') }; // prettier-ignore
const others = { 400: file('noto-sans', '400Regular', 'NotoSans'), 600: file('noto-sans', '600SemiBold', 'NotoSans') }; // prettier-ignore
const figures = { 400: file('martian-mono', '400Regular', 'MartianMono'), 600: file('martian-mono', '500Medium', 'MartianMono') }; // prettier-ignore

/** Text; for names in Greek, Cyrillic and other letters that its font lacks, a second font stands behind it. */
export const sans = ['Text', 'Others'];
/** Figures and digests. */
export const mono = ['Figures', 'Others'];

let glyphs: fontkit.Font[] = [];

/** Registers the shipped fonts, once a process. Nothing is fetched. */
export function registerFonts(): void {
  if (glyphs.length) return;
  for (const [family, files] of Object.entries({ Text: text, Others: others, Figures: figures }))
    Font.register({
      family,
      fonts: Object.entries(files).map(([weight, src]) => ({ src, fontWeight: Number(weight) })),
    });
  // Words stay whole.
  Font.registerHyphenationCallback((word) => [word]);
  glyphs = [text, others].map((files) => fontkit.openSync(files[400]) as fontkit.Font);
}

/** Signs that none of the fonts has, spelled out. */
const spelled: Record<string, string> = { '≥': '>=', '≤': '<=', '≈': 'about ' };

/** Text as these fonts can draw it; a letter that none of them has becomes "?", never nothing. */
export function drawable(given: string): string {
  const has = (char: string) => glyphs.some((font) => font.hasGlyphForCodePoint(char.codePointAt(0)!));
  return Array.from(given.normalize('NFC'), (char) =>
    /\s/.test(char) || has(char) ? char : (spelled[char] ?? '?'),
  ).join('');
}
