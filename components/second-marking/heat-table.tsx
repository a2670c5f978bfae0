import type { CSSProperties } from 'react'
import { sayMark, type HalfMarks } from '@/lib/core/marks'
import type { HeatCell, ModerationFigures } from '@/lib/core/moderation-figures'
import { sayMean } from '@/lib/core/say-difference'
import styles from './figures.module.css'

/** How strongly a mean is tinted: fully from twice the tolerance on, in percent. A tolerance of nought counts as half a mark. */
function tintOf(mean: number, tolerance: HalfMarks): number {
  return Math.round(Math.min(1, Math.abs(mean) / (2 * Math.max(1, tolerance))) * 34)
}

function Cell({ cell, tolerance }: { cell: HeatCell | undefined; tolerance: HalfMarks }) {
  if (!cell || cell.mean === null) return <td className="soft">–</td>
  const { mean, n, within, few } = cell
  const beyond = Math.abs(mean) > tolerance
  return (
    <td className={`${styles.heat} ${mean > 0 ? styles.higher : styles.lower} ${beyond ? styles.beyond : ''}`} style={{ '--tint': `${tintOf(mean, tolerance)}%` } as CSSProperties}>
      <b>{sayMean(mean)}</b> <span>{mean === 0 ? 'level' : mean > 0 ? 'higher' : 'lower'}{beyond ? ', outside' : ''}</span>
      <small>{within} of {n} inside{few ? ', few' : ''}</small>
    </td>
  )
}

/** Each first marker in each question: the mean of first minus second, in words and figures, the tint only underlining it. */
export function HeatTable({ moderation: { questions, markers, heat } }: { moderation: ModerationFigures }) {
  const asked = questions.filter(({ figures }) => figures.n > 0)
  return (
    <>
      <div className={styles.wide} tabIndex={0} role="group" aria-label="Markers by question">
        <table className={`tbl ${styles.heatTable}`}>
          <thead><tr><th scope="col">First marker</th>{asked.map(({ key, label, tolerance }) => <th key={key} scope="col">{label}{tolerance !== null && <small> ±{sayMark(tolerance)}</small>}</th>)}</tr></thead>
          <tbody>
            {markers.map(({ key, label }) => (
              <tr key={key}>
                <th scope="row">{label}</th>
                {asked.map((question) => <Cell key={question.key} cell={heat.find((cell) => cell.markerId === key && cell.questionId === question.key)} tolerance={question.tolerance ?? (0 as HalfMarks)} />)}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <p className="small soft mt-1">Mean of first minus second in marks. “higher”: this marker gave more than the second marker; “outside”: by more than the tolerance, on average. “few”: under 15 answers.</p>
    </>
  )
}
