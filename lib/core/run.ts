import type { MarkingState } from './marking'
import type { HalfMarks, MarkingStep } from './marks'
import type { MarkPoint } from './paper'
import type { PaperRect } from './paper-space'
import type { Round, Stamp } from './stamp'

/** One answer space of a response as it lies on the student's page; `src` is null while that page has not been scanned. A width in dpi can be asked with `&dpi=`. */
export type StripPicture = Readonly<{ spaceId: string; scriptPageId: string | null; rect: PaperRect; src: string | null }>
/** A whole page of the script, in paper points. */
export type PagePicture = Readonly<{ scriptPageId: string; paperPage: number | null; width: number; height: number; src: string }>

/** What stands in the way of the person who asks: another marker has begun it, or they were its first marker themselves. */
export type StripBar = 'begun-by-other' | 'own-first'

/** One response in a run. `marking` is of the person who asks, in the round that was asked for, and no other. */
export type Strip = Readonly<{
  responseId: string
  /** Its place in this run, from 1. */
  number: number
  /** Only where names are shown to this person. */
  name: string | null
  pictures: readonly StripPicture[]
  pages: readonly PagePicture[]
  marking: Readonly<{ id: string; state: MarkingState; stamps: readonly Stamp[] }> | null
  bar: StripBar | null
  /** The scan shown here came after what was marked: a page put in later, or scanned again. */
  rescanned: boolean
  flag: Readonly<{ id: string; note: string; answer: string | null }> | null
}>

/** The strips of one question in the order one person marks them. */
export type Run = Readonly<{
  paperId: string
  paperTitle: string
  className: string
  round: Round
  step: MarkingStep
  namesHidden: boolean
  question: Readonly<{ id: string; label: string; text: string; answer: string; modelSolution: string; schemeNote: string; maximum: HalfMarks; points: readonly MarkPoint[] }>
  /** The question that follows in the paper, where this person may go on. */
  next: Readonly<{ id: string; label: string }> | null
  strips: readonly Strip[]
}>
