import type { EffectKind, EffectLine } from '@/lib/core/adjusting'
import { sayMark } from '@/lib/core/marks'
import { sayDifference } from '@/lib/core/say-difference'
import styles from './figures.module.css'

const sayKind: Readonly<Record<EffectKind, string>> = { moves: '', bound: 'as far as it goes', own: 'decided on by name, stays', other: 'another marker’s, stays' }

/** Those whose total changes first, then by running number. */
function inOrder(lines: readonly EffectLine[]): EffectLine[] {
  const still = ({ total }: EffectLine) => (total.before === total.after ? 1 : 0)
  return lines.toSorted((a, b) => still(a) - still(b) || a.number - b.number)
}

/** Every student with mark, total and grade before and after. */
export function EffectTable({ lines, graded, label }: Readonly<{ lines: readonly EffectLine[]; graded: boolean; label: string }>) {
  return (
    <div className={styles.wide} tabIndex={0} role="group" aria-label="Effect on every student">
      <table className={`tbl ${styles.effect}`}>
        <thead><tr><th scope="col">Student</th><th scope="col">{label} now</th><th scope="col">{label} then</th><th scope="col">Total now</th><th scope="col">Total then</th>{graded && <><th scope="col">Grade now</th><th scope="col">Grade then</th></>}<th scope="col">Change</th></tr></thead>
        <tbody>
          {inOrder(lines).map(({ scriptId, number, name, kind, mark, total, grade }) => {
            const moved = total.after - total.before
            return (
              <tr key={scriptId} className={moved === 0 ? 'soft' : undefined}>
                <th scope="row">{name ?? `Script ${number}`}</th>
                <td>{mark ? sayMark(mark.before) : '–'}</td><td>{mark ? sayMark(mark.after) : '–'}</td>
                <td>{sayMark(total.before)}</td><td>{moved === 0 ? sayMark(total.after) : <b className="font-semibold">{sayMark(total.after)}</b>}</td>
                {graded && <><td>{grade.before ?? '–'}</td><td>{grade.before === grade.after ? (grade.after ?? '–') : <b className="font-semibold">{grade.after ?? '–'}</b>}</td></>}
                <td>{moved === 0 ? 'none' : sayDifference(moved)}{sayKind[kind] && <small> {sayKind[kind]}</small>}</td>
              </tr>
            )
          })}
        </tbody>
      </table>
    </div>
  )
}
