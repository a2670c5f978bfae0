import type { PaperLine } from '@/lib/core/paper-left'
import { leftOf, type Left } from './left-words'

export type HomeLine = Readonly<{ line: PaperLine; left: Left; inHand: boolean }>
export type HomeGroup = Readonly<{ className: string | null; lines: readonly HomeLine[] }>

/** Papers by class; what is open before what is done, the newest first. The first thing one can go on with is in hand. */
export function byClass(lines: readonly PaperLine[]): HomeGroup[] {
  const names = [...new Set(lines.map(({ className }) => className))].sort((a, b) => (a === null ? 1 : b === null ? -1 : a.localeCompare(b, 'en', { numeric: true })))
  const groups = names.map((className) => ({ className, lines: lines.filter((line) => line.className === className).map((line) => ({ line, left: leftOf(line), inHand: false })).sort(openThenNewest) }))
  const first = groups.flatMap((group) => group.lines).find(({ left }) => !left.done && left.next !== null)
  return groups.map((group) => ({ ...group, lines: group.lines.map((each) => ({ ...each, inHand: each === first })) }))
}

function openThenNewest(a: HomeLine, b: HomeLine): number {
  if (a.left.done !== b.left.done) return a.left.done ? 1 : -1
  return (b.line.satOn ?? '').localeCompare(a.line.satOn ?? '') || a.line.title.localeCompare(b.line.title)
}
