import { responseState } from '@/lib/core/marking'
import type { Strip } from '@/lib/core/run'
import styles from './desk.module.css'

/** One stroke a script: tall done, dotted nothing written, thick in hand, short to do. */
export function Ruler({ strips, hand }: { strips: readonly Strip[]; hand: number }) {
  const states = strips.map((strip) => responseState(strip.bar && !strip.marking ? null : strip.marking))
  const nothing = states.filter((state) => state === 'nothing-written').length
  const marked = states.filter((state) => state === 'marked' || state === 'nought').length + nothing
  const others = strips.filter((strip) => strip.bar !== null && !strip.marking).length
  const strokeOf = (k: number): string | undefined => {
    if (k === hand) return styles.inHand
    const state = states[k]
    return state === 'nothing-written' ? styles.nothing : state === 'marked' || state === 'nought' ? styles.done : state === 'open' ? styles.open : undefined
  }
  return (
    <>
      <div className={styles.ruler} aria-hidden>{strips.map((strip, k) => <i key={strip.responseId} className={strokeOf(k)} />)}</div>
      <div className={styles.count}>
        <span>{marked} of {strips.length} marked{nothing > 0 && `, ${nothing} of them with nothing written`}{others > 0 && `, ${others} with another marker`}</span>
      </div>
    </>
  )
}
