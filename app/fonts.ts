import localFont from 'next/font/local'

/** Atkinson Hyperlegible: drawn to be told apart in poor light (SIL Open Font License, texts in `fonts/`). */
export const hyper = localFont({
  variable: '--font-hyper',
  display: 'swap',
  src: [
    {
      path: './fonts/atkinson-hyperlegible-next-latin-wght-normal.woff2',
      weight: '200 800',
      style: 'normal',
    },
    {
      path: './fonts/atkinson-hyperlegible-next-latin-wght-italic.woff2',
      weight: '200 800',
      style: 'italic',
    },
  ],
})

/** Letters beyond Latin-1 for names; fetched only by a page that has one. */
export const hyperExtended = localFont({
  variable: '--font-hyper-ext',
  display: 'swap',
  preload: false,
  adjustFontFallback: false,
  src: [
    {
      path: './fonts/atkinson-hyperlegible-next-latin-ext-wght-normal.woff2',
      weight: '200 800',
      style: 'normal',
    },
  ],
  declarations: [
    {
      prop: 'unicode-range',
      value: 'U+0100-0130,U+0132-0151,U+0154-02BA,U+1E00-1E9F,U+1EF2-1EFF,U+2C60-2C7F',
    },
  ],
})

/** For figures that stand in columns and for readings that are compared digit by digit. */
export const hyperMono = localFont({
  variable: '--font-hyper-mono',
  display: 'swap',
  src: [
    {
      path: './fonts/atkinson-hyperlegible-mono-latin-wght-normal.woff2',
      weight: '200 800',
      style: 'normal',
    },
  ],
})
