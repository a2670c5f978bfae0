import type { LeafProblem, PageImage } from '@/lib/core/leaf'

/**
 * A page taken out of a sheaf but not decoded yet; plain values, so that a thread can be handed it.
 * `bytes` of a JPEG or bare CCITT G4 stream; a rendered page has none and is drawn from the sheaf when its turn comes.
 */
export type SheafPage = Readonly<
  { index: number } & (
    | { image: PageImage; bytes: Uint8Array; inverted: boolean }
    | { image: null; bytes: null; problem: LeafProblem | 'must_render' }
  )
>
/** No page image may have more pixels than this: A3 at 600 dpi is 70 million. */
export const mostPixels = 120_000_000
