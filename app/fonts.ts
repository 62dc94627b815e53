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
