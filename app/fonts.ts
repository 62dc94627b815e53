import localFont from 'next/font/local';

/** Headings, prose and the monitor's hand. SIL Open Font License, text beside the files. */
export const newsreader = localFont({
  src: [
    { path: '../fonts/newsreader-latin-standard-normal.woff2', style: 'normal', weight: '200 800' },
    { path: '../fonts/newsreader-latin-standard-italic.woff2', style: 'italic', weight: '200 800' },
  ],
  variable: '--font-newsreader',
  display: 'swap',
  adjustFontFallback: 'Times New Roman',
});

/** Words of the interface. */
export const hyperlegible = localFont({
  src: [
    { path: '../fonts/atkinson-hyperlegible-next-latin-wght-normal.woff2', style: 'normal', weight: '200 800' },
    { path: '../fonts/atkinson-hyperlegible-next-latin-wght-italic.woff2', style: 'italic', weight: '200 800' },
  ],
  variable: '--font-hyperlegible',
  display: 'swap',
});

/** Figures, codes and seals. */
export const hyperlegibleMono = localFont({
  src: '../fonts/atkinson-hyperlegible-mono-latin-wght-normal.woff2',
  weight: '200 800',
  variable: '--font-hyperlegible-mono',
  display: 'swap',
});

/**
 * Letters beyond Western Europe, for names: fetched only by a page that shows one. They stand before the faces above in the list of fonts
 * (tokens.css), because each of those ends in a stand-in for every letter; their range keeps them to their own letters.
 */
export const hyperlegibleExtended = localFont({
  src: [
    { path: '../fonts/atkinson-hyperlegible-next-latin-ext-wght-normal.woff2', style: 'normal', weight: '200 800' },
    { path: '../fonts/atkinson-hyperlegible-next-latin-ext-wght-italic.woff2', style: 'italic', weight: '200 800' },
  ],
  variable: '--font-hyperlegible-extended',
  display: 'swap',
  preload: false,
  adjustFontFallback: false,
  declarations: [{ prop: 'unicode-range', value: 'U+0100-0130, U+0132-0151, U+0154-02BA, U+02BD-02C5, U+02C7-02CC, U+02CE-02D7, U+02DD-02FF, U+1E00-1E9F, U+1EF2-1EFF' }],
});

export const newsreaderExtended = localFont({
  src: '../fonts/newsreader-latin-ext-standard-normal.woff2',
  weight: '200 800',
  variable: '--font-newsreader-extended',
  display: 'swap',
  preload: false,
  adjustFontFallback: false,
  declarations: [{ prop: 'unicode-range', value: 'U+0100-0130, U+0132-0151, U+0154-02BA, U+02BD-02C5, U+02C7-02CC, U+02CE-02D7, U+02DD-02FF, U+1E00-1E9F, U+1EF2-1EFF' }],
});
