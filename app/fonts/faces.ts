import localFont from 'next/font/local';

/** Instrument Sans, upright, Latin: the text face. Files and licence are copied from the fontsource package. */
export const textFace = localFont({
  src: './instrument-sans-latin-wght-normal.woff2',
  weight: '400 700',
  style: 'normal',
  variable: '--font-text',
  display: 'swap',
});

/** Instrument Sans italic, used by emphasised words only, so it is not preloaded. */
export const italicFace = localFont({
  src: './instrument-sans-latin-wght-italic.woff2',
  weight: '400 700',
  style: 'italic',
  variable: '--font-text-italic',
  display: 'swap',
  preload: false,
});

/** Extended Latin letters for people's and places' names; fetched only when such a letter is on the page. */
export const extendedFace = localFont({
  src: './instrument-sans-latin-ext-wght-normal.woff2',
  weight: '400 700',
  style: 'normal',
  variable: '--font-text-ext',
  display: 'swap',
  preload: false,
  adjustFontFallback: false,
  declarations: [
    {
      prop: 'unicode-range',
      value:
        'U+0100-02BA,U+02BD-02C5,U+02C7-02CC,U+02CE-02D7,U+02DD-02FF,U+0329,U+1D00-1DBF,U+1E00-1E9F,U+1EF2-1EFF,U+2020,U+20A0-20AB,U+20AD-20C0,U+2113,U+2C60-2C7F,U+A720-A7FF',
    },
  ],
});

/** Martian Mono with its width axis: figures, codes and digests. */
export const figureFace = localFont({
  src: './martian-mono-latin-standard-normal.woff2',
  weight: '100 800',
  style: 'normal',
  variable: '--font-figure',
  display: 'swap',
  declarations: [
    { prop: 'font-stretch', value: '75% 112.5%' },
    { prop: 'size-adjust', value: '88%' },
  ],
});
