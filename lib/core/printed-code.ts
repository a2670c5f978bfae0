import { mmPerPoint, type PaperPoint, type PaperRect } from './paper-space'

/**
 * Where the code of a page goes: a square of white paper, its quiet zone included, in paper points. Codes are QR symbols of version 1
 * (21 modules a side, ISO/IEC 18004) with a quiet zone of 4 modules round them.
 */
export type CodeSpot = Readonly<{ page: number; rect: PaperRect }>

export const codeModules = 21
export const quietModules = 4
/** Smaller than this a copier's 150 dpi no longer tells the modules apart surely: 18 mm with the quiet zone, in points. */
export const leastCodeSide = 18 / mmPerPoint
export const usualCodeSide = 20 / mmPerPoint
export const mostCodeSide = 40 / mmPerPoint

/** The page that a code stands for. `script` is one printed script, whoever writes on it; `rect` is where the code was printed; `paper` counts the papers of a sheaf from 0, its own. */
export type PrintedPage = Readonly<{ script: string; paperPage: number; rect: PaperRect; paper?: number }>
/** All codes that may be met in a sheaf, by the token that each holds. */
export type PrintedCodes = ReadonlyMap<string, PrintedPage>

/** Sixteen figures and letters, none easily taken for another: 80 random bits, and a symbol of the smallest size can hold them. */
export const tokenLength = 16
export const tokenLetters = '0123456789ABCDEFGHJKMNPQRSTVWXYZ'
const tokenForm = new RegExp(`^[${tokenLetters}]{${tokenLength}}$`)

/** Whether a code read off a page looks like one of ours, whichever paper or school printed it. */
export function isToken(text: string): boolean {
  return tokenForm.test(text)
}

/** The corners of the symbol itself within its square, clockwise from the top left, in paper points. */
export function symbolCorners({ x, y, w, h }: PaperRect): readonly [PaperPoint, PaperPoint, PaperPoint, PaperPoint] {
  const inset = quietModules / (codeModules + 2 * quietModules)
  const [left, top, right, bottom] = [x + inset * w, y + inset * h, x + (1 - inset) * w, y + (1 - inset) * h]
  return [{ x: left, y: top }, { x: right, y: top }, { x: right, y: bottom }, { x: left, y: bottom }]
}
