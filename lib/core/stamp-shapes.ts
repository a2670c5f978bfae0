// The design's stamp outlines in points, origin top left of each; the pen's round ends are cubics here, within 0.01 pt of arcs.

/** A tick, 20 x 18: a short arm down, a long bowed arm up. Swells and tapers like a nib, so it is filled, never stroked. */
export const tickShape =
  'M0.93 9.96C1.4 10.38 2.94 11.35 3.75 12.49C4.55 13.63 5.44 16.09 5.78 16.81C6.06 17.32 6.7 17.5 7.21 17.22C7.72 16.94 7.9 16.3 7.62 15.79C7.17 15.08 5.93 12.63 4.9 11.54C3.88 10.45 2.05 9.63 1.47 9.24C1.27 9.09 0.99 9.13 0.84 9.33C0.69 9.53 0.73 9.81 0.93 9.96Z' +
  'M7.51 16.93C8.28 15.48 10.19 10.85 12.15 8.24C14.1 5.63 18.05 2.42 19.24 1.26C19.38 1.13 19.39 0.9 19.26 0.76C19.13 0.62 18.9 0.61 18.76 0.74C17.48 1.85 13.23 4.84 11.05 7.36C8.88 9.88 6.59 14.45 5.69 15.87C5.4 16.37 5.57 17.02 6.07 17.31C6.57 17.6 7.22 17.43 7.51 16.93Z'
/** The bar across a tick's long arm that makes it a half tick. */
const halfBar = 'M8.47 6.56C9.01 6.9 10.7 7.83 11.74 8.57C12.78 9.32 14.21 10.62 14.7 11.03C15.05 11.31 15.55 11.25 15.83 10.9C16.11 10.55 16.05 10.05 15.7 9.77C15.18 9.37 13.66 8.1 12.56 7.38C11.47 6.66 9.7 5.76 9.13 5.44C8.82 5.26 8.42 5.36 8.24 5.67C8.06 5.98 8.16 6.38 8.47 6.56Z'
export const halfShape = tickShape + halfBar
/** Two crossing tapered strokes, 13 x 13.5. */
export const crossShape =
  'M0.79 1.83C1.67 2.71 4.38 5.28 6.07 7.11C7.75 8.95 10.08 11.88 10.89 12.83C11.24 13.2 11.82 13.22 12.2 12.88C12.59 12.54 12.63 11.96 12.31 11.57C11.46 10.65 8.97 7.8 7.18 6.04C5.4 4.27 2.54 1.81 1.61 0.97C1.37 0.8 1.03 0.83 0.83 1.04C0.62 1.26 0.6 1.6 0.79 1.83Z' +
  'M11.11 0.35C10.28 1.31 7.87 4.12 6.13 6.09C4.4 8.05 1.62 11.12 0.71 12.12C0.56 12.28 0.56 12.54 0.72 12.69C0.88 12.84 1.14 12.84 1.29 12.68C2.26 11.73 5.25 8.85 7.12 7.01C8.98 5.18 11.6 2.54 12.49 1.65C12.81 1.26 12.77 0.7 12.41 0.35C12.04 0.01 11.48 0.01 11.11 0.35Z'
/** Two strokes meeting at the top, 10 x 9. */
export const caretShape =
  'M1.18 8.63C1.59 8.01 2.91 6.13 3.63 4.88C4.35 3.62 5.18 1.74 5.48 1.11C5.61 0.74 5.44 0.34 5.08 0.18C4.73 0.01 4.31 0.15 4.12 0.49C3.86 1.13 3.19 3.04 2.57 4.32C1.95 5.6 0.77 7.53 0.42 8.17C0.34 8.37 0.42 8.61 0.6 8.72C0.79 8.84 1.04 8.8 1.18 8.63Z' +
  'M4.12 1.11C4.45 1.78 5.34 3.87 6.13 5.09C6.92 6.32 8.42 7.88 8.88 8.44C9.01 8.62 9.26 8.65 9.44 8.52C9.62 8.39 9.65 8.14 9.52 7.96C9.12 7.38 7.79 5.75 7.12 4.51C6.45 3.26 5.76 1.16 5.48 0.49C5.29 0.15 4.87 0.01 4.52 0.18C4.16 0.34 3.99 0.74 4.12 1.11Z'
/** An open oval that overruns its start, in shares of its box. */
export const ringShape = 'M.86 .12C.6 -.1 .04 -.08 .01 .5C-.02 1.1 1 1.14 1 .52C1.02 .1 .68 -.06 .42 .05'
/** The ring round a mark in the margin, 44 x 30, and the second line of an agreed one. */
export const markRingShape = 'M36.5 5.2C28 -.4 4.6 -1.2 2.2 13.6C.4 28.4 40.6 31.6 42.2 15.8C43 5.6 30.4 1.6 19.6 3'
export const markRingAroundShape = 'M38.6 1.6C28 -5.4 .8 -4.6 -1.6 13.4C-3.2 33.2 44.4 35.6 46 15.6C46.8 3.2 32.4 -2.4 20 -1.2'

/** Where a stamp is held, in its own frame: a tick at its corner, a cross where its strokes meet, a caret at its tip. */
export const tickAnchor = { x: 6.7, y: 16.3 }
export const crossAnchor = { x: 6.5, y: 6.7 }
export const caretAnchor = { x: 4.8, y: 0.3 }
