import { stampsOf, type DeskState } from './desk-state'
import { sayStampOf } from './say-desk'
import styles from './desk.module.css'

type StampListProps = Readonly<{ state: DeskState; onSelect: (id: string) => void; onTakeBack: (id: string) => void }>

/** The stamps of the strip in hand in words. Comes into view when the keyboard reaches it: arrows move the chosen one, Delete takes it back. */
export function StampList({ state, onSelect, onTakeBack }: StampListProps) {
  const strip = state.strips[state.hand]
  const stamps = stampsOf(strip)
  if (!strip || stamps.length === 0) return null
  return (
    <ul className={styles.stampList} aria-label={`Stamps on script ${strip.number}`}>
      {stamps.map((stamp) => (
        <li key={stamp.id}>
          <button type="button" aria-pressed={stamp.id === state.selected} onFocus={() => onSelect(stamp.id)} onClick={() => onSelect(stamp.id)}
            onKeyDown={(event) => { if (event.key === 'Delete' || event.key === 'Backspace') { event.stopPropagation(); onTakeBack(stamp.id) } }}>
            {sayStampOf(stamp, state.run)}
          </button>
        </li>
      ))}
    </ul>
  )
}
