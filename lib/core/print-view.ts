import type { PaperPage } from './paper'
import type { PaperRect } from './paper-space'
import type { CodeSpot } from './printed-code'

export type PrintClassSet = Readonly<{ id: string; className: string; satOn: string; /** Who is expected: one script each. */ students: number; runs: number; lastPrinted: number | null }>

/** What the page for printing with codes shows. */
export type PrintView = Readonly<{
  paperId: string
  title: string
  /** Changes with each new blank paper; null: there is none yet. */
  blank: string | null
  pages: readonly PaperPage[]
  /** Answer spaces and boxes, which a code must not touch. */
  spaces: readonly Readonly<{ page: number; rect: PaperRect }>[]
  spots: readonly CodeSpot[]
  classSets: readonly PrintClassSet[]
}>
