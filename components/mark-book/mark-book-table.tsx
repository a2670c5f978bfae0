'use client'
import { useRouter } from 'next/navigation'
import { useMemo, useRef, useState, type CSSProperties, type KeyboardEvent } from 'react'
import type { MarkBook, MarkBookCell, MarkBookQuestion } from '@/lib/core/mark-book'
import { BookFoot } from './book-foot'
import { BookHead } from './book-head'
import { BookRow } from './book-row'
import { moveInBook, type CellPlace } from './mark-book-keys'
import styles from './mark-book.module.css'
import { sortRows, type BookOrder } from './sort-rows'

/** Where the cell in hand starts: the first answer still to be marked, else the first cell there is. */
function startOf(rows: MarkBook['rows']): CellPlace | null {
  for (const wanted of ['unmarked', null] as const) {
    for (const [row, { cells }] of rows.entries()) {
      const column = cells.findIndex((cell) => cell !== null && (wanted === null || cell.state === wanted))
      if (column >= 0) return { row, column }
    }
  }
  return null
}

type MarkBookTableProps = Readonly<{ book: MarkBook; onClassSet: (id: string) => void }>

/** The mark book itself: one cell in hand, moved by the arrows; Enter opens the answer, R runs its column. */
export function MarkBookTable({ book, onClassSet }: MarkBookTableProps) {
  const router = useRouter()
  const table = useRef<HTMLTableElement>(null)
  const [order, setOrder] = useState<BookOrder>('name')
  const [taken, setTaken] = useState<{ row: string; question: string } | null>(null)
  const rows = useMemo(() => sortRows(book.rows, order), [book.rows, order])
  const at = placeOf(taken, rows, book.questions) ?? startOf(rows)
  const runOf = (questionId: string) => `/papers/${book.paperId}/mark/${questionId}`
  const hrefOf = (cell: MarkBookCell, { id }: MarkBookQuestion) => {
    if (cell.state === 'missing') return `/papers/${book.paperId}/sort`
    return `${runOf(id)}?response=${cell.responseId}${cell.state === 'hidden' ? '&round=second' : ''}`
  }

  function onKeyDown(event: KeyboardEvent) {
    if (!at || event.ctrlKey || event.metaKey || event.altKey || !(event.target as HTMLElement).dataset.cell) return
    if (event.key.toLowerCase() === 'r') return router.push(runOf(book.questions[at.column]!.id))
    const next = moveInBook(at, event.key, { rows: rows.length, columns: book.questions.length }, ({ row, column }) => rows[row]?.cells[column] != null)
    if (!next) return
    event.preventDefault()
    const key = `${rows[next.row]!.key}/${book.questions[next.column]!.id}`
    table.current?.querySelector<HTMLElement>(`[data-cell="${CSS.escape(key)}"]`)?.focus()
  }

  return (
    <table ref={table} className={styles.book} onKeyDown={onKeyDown} style={{ '--columns': book.questions.length } as CSSProperties} aria-label="Mark book">
      <BookHead book={book} hand={at?.column ?? null} order={order} runOf={runOf} onOrder={setOrder} onClassSet={onClassSet} />
      <tbody>
        {rows.map((row, k) => (
          <BookRow key={row.key} row={row} questions={book.questions} whole={book.whole} hand={at?.row === k ? at.column : null} hrefOf={hrefOf}
            onTake={(column) => setTaken({ row: row.key, question: book.questions[column]!.id })} />
        ))}
      </tbody>
      <BookFoot book={book} />
    </table>
  )
}

function placeOf(taken: { row: string; question: string } | null, rows: MarkBook['rows'], questions: readonly MarkBookQuestion[]): CellPlace | null {
  const row = rows.findIndex(({ key }) => key === taken?.row)
  const column = questions.findIndex(({ id }) => id === taken?.question)
  return row >= 0 && column >= 0 && rows[row]!.cells[column] != null ? { row, column } : null
}
