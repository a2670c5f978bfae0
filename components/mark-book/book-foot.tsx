import type { MarkBook } from '@/lib/core/mark-book'
import styles from './mark-book.module.css'

/** Facility of each question over who has a mark, and the mean of the whole scripts. */
export function BookFoot({ book }: { book: MarkBook }) {
  const { facility, questions, whole, mean, wholeScripts } = book
  return (
    <tfoot>
      <tr>
        <th scope="row" className={`${styles.name} ${whole ? '' : styles.edge}`}>Facility, absent left out</th>
        {whole && <td className={styles.no} />}
        {facility.map(({ facility: share, n }, k) => (
          <td key={questions[k]!.id} title={`n = ${n}`}>
            {share === null ? '–' : <>{share.toFixed(2)}<span className="vh"> of {n} answers</span><span className={styles.bar} aria-hidden><i style={{ width: `${Math.round(share * 100)}%` }} /></span></>}
          </td>
        ))}
        {whole && <td className={styles.total}>mean {mean === null ? '–' : (mean / 2).toFixed(1)}<br />n = {wholeScripts}</td>}
        {whole && <td className={styles.grade} />}
      </tr>
    </tfoot>
  )
}
