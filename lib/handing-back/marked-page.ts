import { drawStamp } from '@/lib/core/drawing'
import { sayMark, type HalfMarks } from '@/lib/core/marks'
import { shownPaper, shownRight, type Homography, type PaperRect } from '@/lib/core/paper-space'
import { pageTotal, ringOfMark, ringPlaces } from '@/lib/core/ring-of-mark'
import { meaningOfCode, sayStamp } from '@/lib/core/say-stamp'
import type { Pen, Stamp } from '@/lib/core/stamp'
import type { Drawing } from './paint-ink'
import type { Summary } from './summary'

/** A stamp of the marking that counts, with the pen of its round and the label of its question. */
export type PressedStamp = Readonly<{ stamp: Stamp; pen: Pen; label: string }>
/** The mark of a question, shown beside its answer space (the last one, where a question runs over pages). */
export type SpaceMark = Readonly<{ label: string; space: PaperRect; mark: HalfMarks; pen: Pen }>
/** All marking of one page. Sizes of the paper in points, of the image in pixels; `total` is the page's own sum, or null. */
export type MarkedPage = Readonly<{
  paper: Readonly<{ width: number; height: number }>
  image: Readonly<{ width: number; height: number }>
  homography: Homography
  stamps: readonly PressedStamp[]
  marks: readonly SpaceMark[]
  total: Readonly<{ mark: HalfMarks; pen: Pen }> | null
}>

/** The page's drawings: stamps where they were pressed, then the marks in their rings and the page's sum, in the part the scan shows. */
export function drawMarkedPage({ paper, image, homography, stamps, marks, total }: MarkedPage): Drawing[] {
  const shown = shownPaper(homography, image, paper)
  const rightAt = (y: number): number => shownRight(homography, image, paper, y)
  const places = ringPlaces(marks.map(({ space }) => space), shown, rightAt)
  const foot = shown.y + shown.h
  return [
    ...kept(stamps).map(({ stamp, pen, label }) => ({ pen, inks: drawStamp(stamp), of: { id: stamp.id, kind: stamp.kind, label, says: sayStamp(stamp), text: stamp.text.trim() } })),
    ...marks.map(({ mark, pen, label }, k) => ({ pen, inks: ringOfMark(mark, pen, places[k]!), of: { id: `mark-${label}`, kind: 'question-mark' as const, label, says: `Mark ${sayMark(mark)}`, text: '' } })),
    ...(total ? [{ pen: total.pen, inks: pageTotal(total.mark, total.pen, { ...shown, w: Math.min(rightAt(foot - 34), rightAt(foot)) - shown.x }), of: { id: 'page-total', kind: 'page-total' as const, label: null, says: `Page total ${sayMark(total.mark)}`, text: '' } }] : []),
  ]
}

/** The page in words: what was put on it question by question, and each mark. `number` counts from 1. */
export function sayMarkedPage({ stamps, marks }: Pick<MarkedPage, 'stamps' | 'marks'>, number: number): string {
  const labels = [...new Set([...kept(stamps), ...marks].map(({ label }) => label))]
  const lines = labels.map((label) => {
    const said = kept(stamps).filter((pressed) => pressed.label === label).map(({ stamp }) => sayStamp(stamp))
    const mark = marks.find((mark) => mark.label === label)
    return `Question ${label}: ${[...said, ...(mark ? [`mark ${sayMark(mark.mark)}`] : [])].join('; ')}.`
  })
  return [`Page ${number} of the script, a picture of handwriting.`, ...lines].join(' ')
}

/** The text codes on a script and what they stand for, each once, for the summary's key. */
export function codesOn(stamps: readonly PressedStamp[]): Summary['codes'] {
  const codes = new Set(kept(stamps).filter(({ stamp }) => stamp.kind === 'code').map(({ stamp }) => stamp.text.trim()))
  return [...codes].flatMap((code) => {
    const means = meaningOfCode(code)
    return means ? [{ code, means }] : []
  })
}

function kept(stamps: readonly PressedStamp[]): PressedStamp[] {
  return stamps.filter(({ stamp }) => !stamp.removed)
}
