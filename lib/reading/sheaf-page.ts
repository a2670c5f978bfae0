import type { LeafProblem, PageImage } from '@/lib/core/leaf'

/** The one image of a page as it is coded in the file: a JPEG's bytes or a bare CCITT G4 stream. `inverted`: its black is white. */
export type LiftedImage = Readonly<{ image: PageImage; bytes: Uint8Array; inverted: boolean }>

/** A page taken out of a sheaf but not decoded yet. One that has no image to be lifted is drawn from a PDF that holds it alone. */
export type SheafPage = Readonly<{ index: number } & (LiftedImage | { image: null; problem: LeafProblem | 'must_render' })>

/** No page image may have more pixels than this: A3 at 600 dpi is 70 million. */
export const mostPixels = 80_000_000

/** A sheaf of more pages is to be sent in parts. */
export const mostPages = 2000
