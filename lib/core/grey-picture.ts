import type { PaperRect } from './paper-space'

/** A picture in shades of grey, row by row, 0 black to 255 white. Where it lies in space is told by whoever holds it. */
export type GreyPicture = Readonly<{ width: number; height: number; data: Uint8Array }>

/** A page of the blank paper: its size in points, and its picture at `templateDpi` (pixel = point * dpi / 72). */
export type BlankPage = Readonly<{
  page: number
  /** Which paper it is a page of, from 0, where a sheaf may hold several. */
  paper?: number
  widthPoints: number
  heightPoints: number
  picture: GreyPicture
  /** The boxes of the candidate number on this page, a digit each, in points. */
  numberBoxes?: readonly PaperRect[]
}>

/** Dots per inch at which blank pages are drawn and leaves are registered to them. */
export const templateDpi = 100
