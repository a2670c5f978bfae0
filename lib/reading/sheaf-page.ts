import { AppError } from '@/lib/core/errors'
import type { LeafProblem, PageImage } from '@/lib/core/leaf'

/** What keeps a page from being read. */
export type PageProblem = Exclude<LeafProblem, 'page_empty'>

/** The problem as an error that names the page, counted from 1. */
export function pageError(problem: PageProblem, index: number): AppError {
  return new AppError(problem, { page: index + 1 })
}

/** The one image of a page as it is coded in the file: a JPEG's bytes or a bare CCITT G4 stream. `inverted`: its black is white; `broken`: the file ends within it. */
export type LiftedImage = Readonly<{ image: PageImage; bytes: Uint8Array; inverted: boolean; broken: boolean }>

/** A page taken out of a sheaf but not decoded yet. One that has no image to be lifted is drawn from a PDF that holds it alone. */
export type SheafPage = Readonly<{ index: number } & (LiftedImage | { image: null; problem: PageProblem | 'must_render' })>

/** No page image may have more pixels than this: A3 at 600 dpi is 70 million. */
export const mostPixels = 80_000_000

/** A sheaf of more pages is to be sent in parts. */
export const mostPages = 2000
