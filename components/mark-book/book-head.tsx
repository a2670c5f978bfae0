import Link from 'next/link'
import type { MarkBook } from '@/lib/core/mark-book'
import { sayMark } from '@/lib/core/marks'
import styles from './mark-book.module.css'
import type { BookOrder } from './sort-rows'

type BookHeadProps = Readonly<{
  book: MarkBook
  hand: number | null
  order: BookOrder
  runOf: (questionId: string) => string
  onOrder: (order: BookOrder) => void
  onClassSet: (id: string) => void
}>

function ClassSetPick({ book, onClassSet }: Pick<BookHeadProps, 'book' | 'onClassSet'>) {
  if (book.classSets.length < 2) return null
  return (
    <select className={styles.pick} aria-label="Class set" value={book.classSetId ?? ''} onChange={(event) => onClassSet(event.target.value)}>
      {book.classSets.map(({ id, className, satOn }) => <option key={id} value={id}>{className}, {satOn}</option>)}
    </select>
  )
}

const firstAndLast = (grades: readonly string[]) => (grades.length === 0 ? 'no scale' : grades.length < 2 ? grades[0] : `${grades[0]} to ${grades.at(-1)}`)

/** Column heads: names and totals sort, a question leads to its run, the grade to the grade scale. */
export function BookHead({ book, hand, order, runOf, onOrder, onClassSet }: BookHeadProps) {
  const { questions, whole, maximum, gradeNames, paperId } = book
  const sorted = (one: BookOrder) => (order === one ? (one === 'total' ? 'descending' : 'ascending') : undefined)
  return (
    <thead>
      <tr>
        <th scope="col" className={`${styles.name} ${whole ? '' : styles.edge}`} aria-sort={sorted('name')}>
          {whole ? <button className={styles.small} onClick={() => onOrder('name')}>Student</button> : <span className={styles.small}>Script</span>}
          <ClassSetPick book={book} onClassSet={onClassSet} />
        </th>
        {whole && <th scope="col" className={styles.no} aria-sort={sorted('number')}><button className={styles.small} onClick={() => onOrder('number')}>No.</button></th>}
        {questions.map(({ id, label, maximum: most, withdrawn }, k) => (
          <th key={id} scope="col" className={`${hand === k ? styles.now : ''} ${withdrawn ? styles.withdrawn : ''}`} title={withdrawn ? `Withdrawn: ${withdrawn === 'out' ? 'left out of totals' : 'full marks for everyone'}` : undefined}>
            <Link prefetch={false} href={runOf(id)} aria-label={`${label}, of ${sayMark(most)}: run this column${withdrawn ? ', withdrawn' : ''}`}>{label}</Link><small aria-hidden>{sayMark(most)}</small>
          </th>
        ))}
        {whole && <th scope="col" className={styles.total} aria-sort={sorted('total')}><button onClick={() => onOrder('total')}>Total</button><small>of {sayMark(maximum)}</small></th>}
        {whole && <th scope="col" className={styles.grade}><Link href={`/papers/${paperId}/grades`} aria-label="Grade: open the grade scale">Grade</Link><small>{firstAndLast(gradeNames)}</small></th>}
      </tr>
    </thead>
  )
}
