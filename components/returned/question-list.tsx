import { MarkFigure } from '@/components/ui/mark-figure'
import { sayMark } from '@/lib/core/marks'
import type { ReturnedDetail } from '@/lib/core/returned'
import styles from './returned.module.css'

/** Marks by question; pressing a label turns to its page. */
export function QuestionList({ detail, onPage }: { detail: ReturnedDetail; onPage: (page: number) => void }) {
  return (
    <table className={styles.list}>
      <caption className="vh">Marks by question</caption>
      <tbody>
        {detail.questions.map(({ label, mark, maximum, remark, areas }) => (
          <tr key={label} className={mark === 0 ? styles.zero : undefined}>
            <th scope="row">{areas[0] ? <button type="button" onClick={() => onPage(areas[0]!.page)} aria-label={`Question ${label}, turn to page ${areas[0].page + 1}`}>{label}</button> : label}</th>
            <td>{mark === null ? '–' : <MarkFigure mark={mark} />}</td>
            <td className="soft">{remark ?? ''}</td>
            <td className="soft">of {sayMark(maximum)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  )
}
