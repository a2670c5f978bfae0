import type { MouseEvent } from 'react'
import { KeyCap } from '@/components/ui/key-cap'
import { sayMark } from '@/lib/core/marks'
import { pointsWithoutBase } from '@/lib/core/press-rules'
import type { Strip } from '@/lib/core/run'
import { penOf } from '@/lib/core/stamp'
import { stampsOf, type DeskState } from './desk-state'
import { givenOn } from './desk-step'
import { pointKeys, type Command } from './keys'
import { StampIcon } from './stamp-icon'
import styles from './desk.module.css'

type PointKeysProps = Readonly<{ strip: Strip; run: DeskState['run']; onCommand: (command: Command) => void }>

/** The mark points under the strip in hand: each with its letter, and what it was given. */
export function PointKeys({ strip, run, onCommand }: PointKeysProps) {
  const { points } = run.question
  if (points.length === 0) return null
  const lone = new Set(pointsWithoutBase(stampsOf(strip), points).map((point) => point.id))
  const parts = points.some((point) => point.worth > run.step)
  const press = (index: number) => (event: MouseEvent<HTMLButtonElement>): void => {
    if (event.detail > 0) event.currentTarget.blur()
    onCommand({ do: 'point', index, part: event.shiftKey })
  }
  // A long press on a tablet, or the other mouse button, gives a part.
  const part = (index: number) => (event: MouseEvent<HTMLButtonElement>): void => {
    event.preventDefault()
    onCommand({ do: 'point', index, part: true })
  }
  return (
    <div className={`${styles.points} ${penOf(run.round)}`} role="group" aria-label="Mark points">
      {points.map((point, index) => {
        const given = givenOn(strip, point)
        const key = pointKeys[index]?.toUpperCase()
        return (
          <button key={point.id} type="button" className={given > 0 ? styles.given : undefined} aria-pressed={given > 0} disabled={strip.bar !== null} onClick={press(index)} onContextMenu={part(index)}
            aria-label={`${point.label}, ${given > 0 ? `${sayMark(given)} of ${sayMark(point.worth)} given` : `worth ${sayMark(point.worth)}`}${key ? `, key ${key}` : ''}${lone.has(point.id) ? ', needs its method mark' : ''}`}>
            {key && <KeyCap>{key}</KeyCap>}
            <span className={styles.name}>{point.label}</span>
            {given > 0 ? <><StampIcon kind={given === 1 ? 'half' : 'tick'} scale={1} /><span className={styles.worth}>{sayMark(given)}</span>{given < point.worth && <span className={styles.left}>of {sayMark(point.worth)}</span>}</> : <span className={styles.left}>{sayMark(point.worth)}</span>}
            {lone.has(point.id) && <span className={styles.left}>needs its method mark</span>}
          </button>
        )
      })}
      {parts && <span className={styles.hint}><KeyCap>⇧</KeyCap><span className={styles.left}>with its key: part of it</span></span>}
    </div>
  )
}
