import localFont from 'next/font/local'

// Shipped with the application; latin first, latin-ext for names it does not hold.
const hyper = localFont({
  src: [
    { path: '../node_modules/@fontsource-variable/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-latin-wght-normal.woff2', style: 'normal', weight: '200 800' },
    { path: '../node_modules/@fontsource-variable/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-latin-wght-italic.woff2', style: 'italic', weight: '200 800' },
  ],
  variable: '--font-hyper',
})
const hyperExt = localFont({
  src: '../node_modules/@fontsource-variable/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-latin-ext-wght-normal.woff2',
  weight: '200 800', variable: '--font-hyper-ext', preload: false,
})
const literata = localFont({
  src: [
    { path: '../node_modules/@fontsource-variable/literata/files/literata-latin-opsz-normal.woff2', style: 'normal', weight: '200 900' },
    { path: '../node_modules/@fontsource-variable/literata/files/literata-latin-opsz-italic.woff2', style: 'italic', weight: '200 900' },
  ],
  variable: '--font-literata',
})
const literataExt = localFont({
  src: '../node_modules/@fontsource-variable/literata/files/literata-latin-ext-opsz-normal.woff2',
  weight: '200 900', variable: '--font-literata-ext', preload: false,
})

/** Class names that set the font variables the tokens name. */
export const fontClasses = [hyper, hyperExt, literata, literataExt].map((font) => font.variable).join(' ')
