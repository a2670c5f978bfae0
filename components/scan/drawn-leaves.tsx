import type { LeafLine, SheafProgress } from '@/lib/core/sheaf-progress'
import style from './scan.module.css'

const dense = 120

/** One drawn leaf per sheet: read, turned, an empty back, loose, not readable; the one being read in hand. The words stand below. */
export function DrawnLeaves({ sheaf }: { sheaf: SheafProgress }) {
  // Of two pages on one sheet the one to look at is drawn.
  const lines = new Map(sheaf.leaves.toSorted((a, b) => rank(a) - rank(b)).map((leaf) => [leaf.number, leaf]))
  const now = sheaf.state === 'reading' ? firstMissing(lines, sheaf.leafCount) : null
  return (
    <div className={`${style.leaves} ${sheaf.leafCount > dense ? style.many : ''}`} aria-hidden>
      {Array.from({ length: sheaf.leafCount }, (_, k) => <i key={k} className={k + 1 === now ? style.now : lookOf(lines.get(k + 1))} />)}
    </div>
  )
}

const quiet: readonly LeafLine['look'][] = ['blank', 'set_aside', 'clear', 'placed']
const rank = ({ look }: LeafLine): number => (look === 'unreadable' ? 9 : quiet.includes(look) ? quiet.indexOf(look) : 8)

function firstMissing(lines: ReadonlyMap<number, LeafLine>, leafCount: number): number | null {
  for (let number = 1; number <= leafCount; number++) if (!lines.has(number)) return number
  return null
}

function lookOf(leaf: LeafLine | undefined): string | undefined {
  if (!leaf) return undefined
  if (leaf.look === 'unreadable') return style.bad
  if (leaf.look === 'loose' || leaf.look === 'unclear') return style.loose
  if (leaf.look === 'blank' || leaf.look === 'set_aside') return style.empty
  return leaf.turned ? style.turned : style.read
}
