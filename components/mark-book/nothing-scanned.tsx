import Link from 'next/link'
import type { MarkBook } from '@/lib/core/mark-book'
import { counted } from '@/components/paper/stage-words'
import styles from './mark-book.module.css'

/** The slip on an empty mark book: what the next thing to do is. */
export function NothingScanned({ book }: { book: MarkBook }) {
  const { paperId, questions, rows, classSets } = book
  const set = questions.length > 0 && classSets.length > 0
  return (
    <div className={`slip ${styles.slip}`}>
      <h2>{set ? 'Nothing scanned yet' : 'This paper is not set yet'}</h2>
      <p>{set
        ? `Put the pile through the copier as one PDF. The paper is set: ${counted(questions.length, 'question', 'questions')}, ${counted(rows.length, 'student', 'students')} on the list.`
        : 'Name its class and draw where the answers go. Then the marks have a place.'}</p>
      <Link className="btn lead" href={`/papers/${paperId}/${set ? 'scan' : 'set'}`}>{set ? 'Choose the sheaf' : 'Set the paper'}</Link>
    </div>
  )
}
