import Link from 'next/link'
import type { MarkBookCell, MarkBookQuestion, MarkBookRow } from '@/lib/core/mark-book'
import { MarkFigure } from '@/components/ui/mark-figure'
import { CellFigure } from './cell-figure'
import styles from './mark-book.module.css'

const away = { absent: 'absent', excused: 'excused', expected: 'no script yet' } as const

type BookRowProps = Readonly<{
  row: MarkBookRow
  questions: readonly MarkBookQuestion[]
  whole: boolean
  /** Column of the cell in hand when it is in this row. */
  hand: number | null
  hrefOf: (cell: MarkBookCell, question: MarkBookQuestion) => string
  onTake: (column: number) => void
}>

function classOf(cell: MarkBookCell, inHand: boolean): string {
  const sign = cell.agreed ? styles.agreed : cell.secondMarked ? styles.second : ''
  const state = cell.state === 'missing' ? styles.gone : cell.state === 'hidden' ? styles.withheld : ''
  return `${sign} ${state} ${inHand ? styles.hand : ''}`
}

function RowName({ row, whole }: Pick<BookRowProps, 'row' | 'whole'>) {
  if (!whole || row.studentId === null) return <>Script {row.scriptNumber}{whole && <span className="soft">, no name yet</span>}</>
  return <><b>{row.familyName}</b>, {row.givenName}{!row.named && <span className="soft" title="The name is not confirmed yet"> ?<span className="vh"> name not confirmed</span></span>}</>
}

/** One student's line: each answer a link to it on the desk, the total and the grade. */
export function BookRow({ row, questions, whole, hand, hrefOf, onTake }: BookRowProps) {
  const stays = row.cells.every((cell) => cell === null)
  return (
    <tr className={hand === null ? undefined : styles.rowNow}>
      <th scope="row" className={`${styles.name} ${whole ? '' : styles.edge} ${stays ? styles.awayName : ''}`}><RowName row={row} whole={whole} /></th>
      {whole && <td className={styles.no}>{row.candidateNumber}</td>}
      {stays && questions.length > 0 && <td colSpan={questions.length} className={styles.away}><span>{away[row.attendance]}</span></td>}
      {!stays && questions.map((question, k) => {
        const cell = row.cells[k]
        if (!cell) return <td key={question.id} />
        const figure = <CellFigure cell={cell} />
        return (
          <td key={question.id} className={classOf(cell, hand === k)}>
            <Link prefetch={false} href={hrefOf(cell, question)} tabIndex={hand === k ? 0 : -1} data-cell={`${row.key}/${question.id}`} onFocus={() => onTake(k)}>
              {hand === k ? <span className={styles.swipeOver}>{figure}</span> : figure}
            </Link>
          </td>
        )
      })}
      {whole && <td className={`${styles.total} ${row.total && row.total.toCome > 0 ? styles.open : ''}`}>{row.total && <MarkFigure mark={row.total.final} more={row.total.toCome > 0} />}</td>}
      {whole && <td className={`${styles.grade} ${row.grade ? '' : styles.open}`}>{row.total && (row.grade ?? <span aria-label="no grade yet">–</span>)}</td>}
    </tr>
  )
}
